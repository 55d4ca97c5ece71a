/** Phases of the controller, in the order of their numbers in a trace. */
export const PHASES = ['standstill', 'starting', 'running', 'stopping', 'manual'] as const;
export type Phase = (typeof PHASES)[number];

/**
 * Columns of a trace row, one row per control tick (time = tick × sample period). Plant values are those
 * before the tick's commands; `setPointN` and `phase` are the tick's own; `outputPct` is the previous tick's.
 */
export const TRACE_COLUMNS = [
  'tensionN',
  'measuredN',
  'setPointN',
  'outputPct',
  'lineMps',
  'rollRadps',
  'radiusM',
  'slackM',
  'torqueNm',
  'brakeC',
  'dancerM',
  'phase',
] as const;
export type TraceColumn = (typeof TRACE_COLUMNS)[number];

/** Place of each column within a row. */
export const COLUMN = Object.fromEntries(
  TRACE_COLUMNS.map((name, place) => [name, place]),
) as Readonly<Record<TraceColumn, number>>;

/** Rows of a trace in one transferable array: row r, column c at `rows[r × TRACE_COLUMNS.length + c]`. */
export class TraceBlock {
  readonly rows: Float64Array;
  /** Rows written so far. */
  count = 0;

  constructor(readonly capacity: number) {
    this.rows = new Float64Array(capacity * TRACE_COLUMNS.length);
  }

  /** Value of `column` in row `row`; NaN outside the rows written. */
  at(row: number, column: TraceColumn): number {
    if (row < 0 || row >= this.count) return NaN;
    return this.rows[row * TRACE_COLUMNS.length + COLUMN[column]]!;
  }
}
