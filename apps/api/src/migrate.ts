import { setting } from './config/config.js';
import { makeDataSource } from './database/data-source.js';

// As the owner of the tables: `up` (the default), `down` by one, or `show`.
const [act = 'up'] = process.argv.slice(2);
const db = await makeDataSource(setting('OWNER_DATABASE_URL'), 2).initialize();
if (act === 'up') {
  const done = await db.runMigrations();
  process.stdout.write(`${done.length === 0 ? 'Nothing to apply' : `${done.length} applied`}\n`);
} else if (act === 'down') {
  await db.undoLastMigration();
  process.stdout.write('The last one is undone\n');
} else {
  const rows = await db.query<{ name: string }[]>('SELECT name FROM migrations ORDER BY id');
  process.stdout.write(`${rows.map((row) => row.name).join('\n')}\n`);
}
await db.destroy();
