import 'reflect-metadata';
import {DataSource} from 'typeorm';
import {ENTITIES} from '../features';
import {MIGRATIONS} from './migrations/list';
import {PostgresNaming} from './naming';

/** Connections of one process. */
const POOL_SIZE = 10;
const CONNECT_WITHIN_MS = 5_000;

/** Describes our database; `initialize()` opens it. The schema changes by migrations alone. */
export function makeDataSource(url: string, poolSize = POOL_SIZE): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: [...ENTITIES],
    migrations: MIGRATIONS,
    migrationsTableName: 'migration',
    migrationsTransactionMode: 'each',
    namingStrategy: new PostgresNaming(),
    synchronize: false,
    installExtensions: false,
    poolSize,
    applicationName: 'evenspan',
    connectTimeoutMS: CONNECT_WITHIN_MS,
  });
}
