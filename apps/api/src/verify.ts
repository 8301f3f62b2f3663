import { Client } from 'pg';

import { setting } from './config/config.js';
import { ASSERTIONS } from './features/verify/assertions.js';
import { verifyLedger } from './features/verify/verify-ledger.js';

// Exit 0 only when every assertion ran and held; a database that is away is a failure.
const client = new Client({
  connectionString: setting('READER_DATABASE_URL'),
  connectionTimeoutMillis: 3000,
});
try {
  await client.connect();
  const { lines, failed, ran } = await verifyLedger(client);
  process.stdout.write(
    `${lines.join('\n')}\n${failed === 0 ? 'Every carat is accounted for.' : `${failed} of ${ran} do not hold.`}\n`,
  );
  process.exitCode = failed === 0 && ran === ASSERTIONS.length ? 0 : 1;
} catch (error) {
  process.stdout.write(
    `FAIL the ledger could not be verified: ${error instanceof Error ? error.message : 'unknown'}\n`,
  );
  process.exitCode = 1;
} finally {
  await client.end().catch(() => undefined);
}
