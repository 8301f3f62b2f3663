import { createServer } from 'node:http';

import { readConfig } from './config/config.js';
import { makeDataSource } from './database/data-source.js';
import { log } from './http/log.js';
import { buildServer } from './server.js';

const config = readConfig();
const db = await makeDataSource(config.databaseUrl).initialize();
const { app, close } = buildServer(config, db);
const server = createServer(
  { requestTimeout: 30_000, headersTimeout: 15_000, keepAliveTimeout: 5000, maxHeaderSize: 16_384 },
  app,
);
server.maxConnections = 500;
server.on('error', (error: NodeJS.ErrnoException) => {
  process.stderr.write(
    error.code === 'EADDRINUSE'
      ? `Port ${config.port} is taken. Choose another with PORT.\n`
      : `${error.message}\n`,
  );
  process.exit(1);
});
server.listen(config.port, config.host, () =>
  log({ level: 'info', listening: `${config.host}:${config.port}` }),
);

let isStopping = false;
function stop(): void {
  if (isStopping) return;
  isStopping = true;
  server.close(() => void Promise.all([close(), db.destroy()]).then(() => process.exit(0)));
  server.closeIdleConnections();
  // What still runs has ten seconds to end.
  setTimeout(() => process.exit(0), 10_000).unref();
}
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
