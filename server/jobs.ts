import {type Job} from './jobs/job';
import {scoreAttempt} from './jobs/score-attempt';

/** What the worker does: one line per job, in alphabetical order. */
export const JOBS: readonly Job[] = [scoreAttempt];
