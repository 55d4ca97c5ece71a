import {type Logger} from 'pino';
import {type DataSource} from 'typeorm';
import {type Config} from './config';
import {type EventHub} from './events/event-hub';
import {type JobSender} from './jobs/job-sender';

/** What the server is built from. */
export interface AppParts {
  readonly config: Config;
  readonly db: DataSource;
  readonly jobs: JobSender;
  readonly events: EventHub;
  readonly log: Logger;
  /** Clock, so that tests need not wait. */
  readonly now: () => Date;
}
