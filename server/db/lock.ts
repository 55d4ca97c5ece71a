import {Client} from 'pg';

/** Numbers of PostgreSQL's advisory locks, one per thing that only one process may do at a time. */
export const LOCKS = {migrate: 7_368_211, seed: 7_368_212} as const;

/** Runs `work` while holding a lock; others who want it wait. The connection that holds it is lent to `work`. */
export async function withLock<T>(
  url: string,
  lock: keyof typeof LOCKS,
  work: (holder: Client) => Promise<T>,
): Promise<T> {
  const holder = new Client({connectionString: url});
  await holder.connect();
  try {
    await holder.query('select pg_advisory_lock($1)', [LOCKS[lock]]);
    return await work(holder);
  } finally {
    await holder.end(); // frees the lock
  }
}
