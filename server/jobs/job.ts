import {type Logger} from 'pino';
import {type DataSource} from 'typeorm';
import type * as z from 'zod';
import {type Config} from '../config';

/** What a job may use. */
export interface WorkerParts {
  readonly config: Config;
  readonly db: DataSource;
  readonly log: Logger;
  readonly now: () => Date;
}

/** One kind of work done outside the calls. It may run twice: it writes by upsert, keyed by what it makes. */
export interface Job<D extends z.ZodType = z.ZodType> {
  /** Name of its queue; no other job's. */
  readonly name: string;
  readonly data: D;
  /** How long one try may take [s]; a worker that died is noticed after this. */
  readonly expireInSeconds: number;
  /** Tries after the first. */
  readonly retryLimit: number;
  /** Does the work; throwing means: try again later. */
  run(data: z.output<D>, parts: WorkerParts): Promise<void>;
  /** Told once when the last try has failed or died. */
  givenUp?(data: z.output<D>, parts: WorkerParts): Promise<void>;
  /** Frees what the job keeps in the worker process: threads. */
  close?(): Promise<void>;
}

/** Describes one job, its types tied together. */
export function job<D extends z.ZodType>(described: Job<D>): Job<D> {
  return described;
}
