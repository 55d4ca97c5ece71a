import {type Job} from './jobs/job';

/** What the worker does: one line per job, in alphabetical order. */
export const JOBS: readonly Job[] = [];
