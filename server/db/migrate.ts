import {Client} from 'pg';
import {makeDataSource} from './data-source';

/** One number for all instances: who holds it migrates, the others wait. */
const LOCK = 7_368_211;

export interface Databases {
  /** The user that owns the tables. */
  readonly ownerUrl: string;
}

/** Brings the database up to this program; two that start at once take turns. */
export async function migrate({ownerUrl}: Databases): Promise<void> {
  const holder = new Client({connectionString: ownerUrl});
  await holder.connect();
  try {
    await holder.query('select pg_advisory_lock($1)', [LOCK]);
    const db = await makeDataSource(ownerUrl, 2).initialize();
    try {
      await db.runMigrations();
    } finally {
      await db.destroy();
    }
  } finally {
    await holder.end(); // frees the lock
  }
}
