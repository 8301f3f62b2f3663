import { DataSource } from 'typeorm';

import { Party } from '../features/parties/party.entity.js';
import { Person } from '../features/people/person.entity.js';
import { migrations } from './migrations/index.js';

/**
 * A data source for one role. The schema only ever comes from migrations, and nothing is logged
 * here, since TypeORM's own loggers print parameters.
 */
export function makeDataSource(url: string, poolSize = 10): DataSource {
  return new DataSource({
    type: 'postgres', url, entities: [Party, Person], migrations, migrationsTransactionMode: 'each',
    synchronize: false, logging: false, poolSize, connectTimeoutMS: 3000,
    extra: { idleTimeoutMillis: 10_000 },
    poolErrorHandler: () => undefined,
  });
}
