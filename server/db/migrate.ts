import {type Logger} from 'pino';
import {JOBS} from '../jobs';
import {makeQueues} from '../jobs/queues';
import {makeDataSource} from './data-source';
import {grantToServer} from './grants';
import {withLock} from './lock';

/** Connections for migrating. */
const POOL_SIZE = 2;

export interface Databases {
  /** The user that owns the tables. */
  readonly databaseOwnerUrl: string;
  /** The server's own user. */
  readonly databaseUrl: string;
}

/** Brings the database up to this program, as its owner; two that start at once take turns. */
export async function migrate(
  {databaseOwnerUrl, databaseUrl}: Databases,
  log: Logger,
): Promise<void> {
  await withLock(databaseOwnerUrl, 'migrate', async (owner) => {
    await runMigrations(databaseOwnerUrl, log);
    await makeQueues(databaseOwnerUrl, JOBS, log);
    const serverUser = userOf(databaseUrl);
    if (serverUser !== userOf(databaseOwnerUrl)) await grantToServer(owner, serverUser);
  });
}

async function runMigrations(url: string, log: Logger): Promise<void> {
  const db = await makeDataSource(url, POOL_SIZE).initialize();
  try {
    const done = await db.runMigrations();
    for (const {name} of done) log.info({migration: name}, 'migrated');
  } finally {
    await db.destroy();
  }
}

function userOf(url: string): string {
  return decodeURIComponent(new URL(url).username);
}
