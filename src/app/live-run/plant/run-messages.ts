import {
  type Act,
  type Fault,
  type LogEntry,
  type Note,
  type Outcome,
  type RunEvent,
  type RunHash,
  type RunView,
  type Scenario,
  type TraceBlock,
} from '#sim-core/index';

/** What starts a run: a document, and a log to take up when it went on before. */
export interface RunStart {
  readonly document: Scenario;
  /** The engine runs to here by itself before anybody takes over [ticks]. */
  readonly handOverTick: number;
  readonly entries: readonly LogEntry[];
  /** The last tick known when a log is taken up; 0 for a new run. */
  readonly throughTick: number;
}

/** From the page to the plant. Each has one answer, in order. */
export type ToPlant =
  | {readonly kind: 'start'; readonly start: RunStart}
  | {readonly kind: 'act'; readonly act: Act}
  | {readonly kind: 'note'; readonly note: Note}
  /** Hands in: an `end` entry with the hash of the run so far. */
  | {readonly kind: 'end'}
  | {readonly kind: 'hash'}
  | {readonly kind: 'advance'; readonly ticks: number};

/** Where the run stands, with every answer. `events` are the new ones. */
export interface Standing {
  readonly view: RunView;
  readonly outcome: Outcome;
  readonly events: readonly RunEvent[];
  readonly settings: Readonly<Record<string, unknown>>;
}

/** Rows since the last answer, as in TraceBlock; the array is handed over, not copied. */
export type Rows = Pick<TraceBlock, 'rows' | 'count'>;

/** From the plant to the page. */
export type FromPlant =
  | {readonly kind: 'started'; readonly standing: Standing; readonly trace: Rows}
  | {readonly kind: 'acted'; readonly standing: Standing; readonly entry: LogEntry}
  | {readonly kind: 'rows'; readonly standing: Standing; readonly trace: Rows}
  | {readonly kind: 'hashed'; readonly hash: RunHash}
  | {readonly kind: 'refused'; readonly faults: readonly Fault[]};
