import {COLUMN, TRACE_COLUMNS, type TraceColumn} from '#sim-core/index';
import {type Rows} from '../plant/run-messages';
import {MinMaxPyramid} from './min-max-pyramid';

/** Kept as they came: measures are computed from these. */
const EXACT: readonly TraceColumn[] = ['tensionN', 'measuredN', 'setPointN', 'outputPct'];
const FIRST_ROWS = 6000; // a minute at 10 ms

type Column = Float64Array | Float32Array | Uint8Array;

/** The whole run, one row a tick, growing by doubling: 61 B a row, 21 MiB an hour at 10 ms. */
export class TraceStore {
  private columns = new Map<TraceColumn, Column>();
  private pyramids = new Map<TraceColumn, MinMaxPyramid>();
  private room = 0;
  /** Rows stored; row r is tick r. */
  count = 0;

  constructor() {
    this.clear();
  }

  clear(): void {
    this.count = 0;
    this.room = FIRST_ROWS;
    this.columns = new Map(TRACE_COLUMNS.map((name) => [name, makeColumn(name, FIRST_ROWS)]));
    this.pyramids = new Map(TRACE_COLUMNS.map((name) => [name, new MinMaxPyramid()]));
  }

  append({rows, count}: Rows): void {
    while (this.count + count > this.room) this.grow();
    const width = TRACE_COLUMNS.length;
    for (const name of TRACE_COLUMNS) {
      const column = this.columns.get(name)!;
      const pyramid = this.pyramids.get(name)!;
      const place = COLUMN[name];
      for (let row = 0; row < count; row++) {
        const value = rows[row * width + place]!;
        column[this.count + row] = value;
        pyramid.add(value);
      }
    }
    this.count += count;
  }

  /** Value of a column in a row; NaN outside the rows stored. */
  at(row: number, name: TraceColumn): number {
    if (row < 0 || row >= this.count) return NaN;
    return this.columns.get(name)![row]!;
  }

  /**
   * Points to draw from row `from` up to `to` (excluded): at most about `most` rows and values, lowest and
   * highest of each stretch in turn, so that no peak is lost.
   */
  points(
    name: TraceColumn,
    from: number,
    to: number,
    most: number,
  ): {rows: number[]; values: number[]} {
    const first = Math.max(0, from);
    const end = Math.min(this.count, to);
    const level = MinMaxPyramid.levelFor(end - first, most);
    if (level !== null) return this.pyramids.get(name)!.points(level, first, end);

    const column = this.columns.get(name)!;
    const rows: number[] = [];
    const values: number[] = [];
    for (let row = first; row < end; row++) {
      rows.push(row);
      values.push(column[row]!);
    }
    return {rows, values};
  }

  private grow(): void {
    this.room *= 2;
    for (const [name, old] of this.columns) {
      const column = makeColumn(name, this.room);
      column.set(old);
      this.columns.set(name, column);
    }
  }
}

function makeColumn(name: TraceColumn, rows: number): Column {
  if (name === 'phase') return new Uint8Array(rows);
  return EXACT.includes(name) ? new Float64Array(rows) : new Float32Array(rows);
}
