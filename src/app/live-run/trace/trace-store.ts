import {COLUMN, TRACE_COLUMNS, type TraceColumn} from '#sim-core/index';
import {type Rows} from '../plant/run-messages';
import {MinMaxPyramid, type PointBuffer} from './min-max-pyramid';

/** Kept as they came: measures are computed from these. */
const EXACT: readonly TraceColumn[] = ['tensionN', 'measuredN', 'setPointN', 'outputPct'];
/** Columns that are drawn: the others need no pyramid. */
const DRAWN: readonly TraceColumn[] = [...EXACT, 'lineMps', 'radiusM'];
const FIRST_ROWS = 6000; // a minute at 10 ms
const WIDTH = TRACE_COLUMNS.length;

type Column = Float64Array | Float32Array | Uint8Array;

/** The whole run, one row a tick, growing by doubling: 61 B a row, 21 MiB an hour at 10 ms. */
export class TraceStore {
  private columns: Column[] = [];
  private pyramids: (MinMaxPyramid | null)[] = [];
  private room = 0;
  /** Rows stored; row r is tick r. */
  count = 0;

  constructor() {
    this.clear();
  }

  /** Bytes that a row takes, the pyramids for drawing left out. */
  get bytesPerRow(): number {
    return this.columns.reduce((sum, column) => sum + column.BYTES_PER_ELEMENT, 0);
  }

  clear(): void {
    this.count = 0;
    this.room = FIRST_ROWS;
    this.columns = TRACE_COLUMNS.map((name) => makeColumn(name, FIRST_ROWS));
    this.pyramids = TRACE_COLUMNS.map((name) =>
      DRAWN.includes(name) ? new MinMaxPyramid() : null,
    );
  }

  append({rows, count}: Rows): void {
    while (this.count + count > this.room) this.grow();
    for (let place = 0; place < WIDTH; place++) {
      const column = this.columns[place]!;
      const pyramid = this.pyramids[place] ?? null;
      for (let row = 0; row < count; row++) {
        const value = rows[row * WIDTH + place]!;
        column[this.count + row] = value;
        pyramid?.add(value);
      }
    }
    this.count += count;
  }

  /** Value of a column in a row; NaN outside the rows stored. */
  at(row: number, name: TraceColumn): number {
    if (row < 0 || row >= this.count) return NaN;
    return this.columns[COLUMN[name]]![row]!;
  }

  /**
   * Fills points to draw from row `from` up to `to` (excluded): the rows themselves, or the lowest and highest
   * of each stretch in turn, so that no peak is lost; as many as the buffer takes. Returns how many.
   */
  fill(name: TraceColumn, from: number, to: number, into: PointBuffer): number {
    const first = Math.max(0, from);
    const end = Math.min(this.count, to);
    const pyramid = this.pyramids[COLUMN[name]] ?? null;
    // two points at the ends may be more than fit evenly
    const level = MinMaxPyramid.levelFor(end - first, into.rows.length - 4);
    if (level !== null && pyramid !== null) return pyramid.fill(level, first, end, into);

    const column = this.columns[COLUMN[name]]!;
    const most = Math.min(end - first, into.rows.length);
    for (let place = 0; place < most; place++) {
      into.rows[place] = first + place;
      into.values[place] = column[first + place]!;
    }
    return Math.max(0, most);
  }

  private grow(): void {
    this.room *= 2;
    this.columns = TRACE_COLUMNS.map((name, place) => {
      const column = makeColumn(name, this.room);
      column.set(this.columns[place]!);
      return column;
    });
  }
}

function makeColumn(name: TraceColumn, rows: number): Column {
  if (name === 'phase') return new Uint8Array(rows);
  return EXACT.includes(name) ? new Float64Array(rows) : new Float32Array(rows);
}
