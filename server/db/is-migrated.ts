import {type DataSource} from 'typeorm';
import {MIGRATIONS} from './migrations/list';

/** Whether the database answers and has seen every migration of ours; a newer server may have added some. */
export async function isMigrated(db: DataSource): Promise<boolean> {
  try {
    const rows: {name: string}[] = await db.query('select name from migration');
    const done = new Set(rows.map(({name}) => name));
    return MIGRATIONS.every(({name}) => done.has(name));
  } catch {
    return false; // it does not answer, or there is no such table yet
  }
}
