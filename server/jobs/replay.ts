import {type LogEntry, type Score, type Scored} from '#sim-core/index';

/** A stored log to be run again and scored. */
export interface ReplayWork {
  readonly exercise: Scored;
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
}

/** What came of it; `refused`: the engine does not take this log. */
export type ReplayAnswer =
  | {
      readonly kind: 'scored';
      readonly score: Score;
      readonly hash: string;
      readonly engine: number;
    }
  | {readonly kind: 'refused'; readonly reason: string};

/** Runs a log again, somewhere. */
export type Replayer = (work: ReplayWork) => Promise<ReplayAnswer>;

/** The replay took too long or too much memory. */
export class ReplayLimitError extends Error {
  constructor(detail: string) {
    super(`The run could not be run again: ${detail} (replay-limit).`);
    this.name = 'ReplayLimitError';
  }
}
