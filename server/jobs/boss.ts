import PgBoss from 'pg-boss';
import {JobSender} from './job-sender';

/** Sends only: it opens no connection of its own, since every job goes through the sender's transaction. */
export function makeJobSender(): JobSender {
  const executeSql = (): Promise<never> =>
    Promise.reject(new Error('jobs are sent in a transaction'));
  return new JobSender(new PgBoss({db: {executeSql}}));
}
