import PgBoss from 'pg-boss';
import {type Logger} from 'pino';
import {JobSender} from './job-sender';

/** Sends only: it opens no connection of its own, since every job goes through the sender's transaction. */
export function makeJobSender(): JobSender {
  const executeSql = (): Promise<never> =>
    Promise.reject(new Error('jobs are sent in a transaction'));
  return new JobSender(new PgBoss({db: {executeSql}}));
}

export interface BossSettings {
  readonly url: string;
  readonly log: Logger;
  /** Whether it may make and change its own schema. */
  readonly migrates?: boolean;
  /** How often the work of dead workers is given back [s]; 0: never. */
  readonly upkeepS?: number;
}

/** pg-boss with connections of its own. */
export function makeBoss({url, log, migrates = false, upkeepS = 0}: BossSettings): PgBoss {
  const boss = new PgBoss({
    connectionString: url,
    application_name: 'evenspan-jobs',
    max: 4,
    migrate: migrates,
    schedule: false, // no job has a time of day yet
    supervise: upkeepS > 0,
    ...(upkeepS > 0 ? {maintenanceIntervalSeconds: upkeepS} : {}),
  });
  boss.on('error', (error) => log.error({err: error}, 'jobs'));
  return boss;
}
