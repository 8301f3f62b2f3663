import pg from 'pg';
import { DataSource } from 'typeorm';

import { Party } from '../features/parties/party.entity.js';
import { Person } from '../features/people/person.entity.js';
import { migrations } from './migrations/index.js';

// A business date is a calendar day, never a moment of some zone.
pg.types.setTypeParser(pg.types.builtins.DATE, (text) => text);

/**
 * A data source for one role. The schema only ever comes from migrations, and nothing is logged
 * here, since TypeORM's own loggers print parameters.
 */
export function makeDataSource(url: string, poolSize = 10): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: [Party, Person],
    migrations,
    migrationsTransactionMode: 'each',
    synchronize: false,
    logging: false,
    poolSize,
    connectTimeoutMS: 3000,
    extra: { idleTimeoutMillis: 10_000 },
    poolErrorHandler: () => undefined,
  });
}
