import {COLUMN, TRACE_COLUMNS} from '#sim-core/index';
import {type Rows} from '../plant/run-messages';
import {type PointBuffer} from './min-max-pyramid';
import {TraceStore} from './trace-store';

const WIDTH = TRACE_COLUMNS.length;

/** Rows whose tension is what `tensionN` says for the row. */
function rowsOf(count: number, tensionN: (row: number) => number, from = 0): Rows {
  const rows = new Float64Array(count * WIDTH);
  for (let row = 0; row < count; row++) {
    rows[row * WIDTH + COLUMN.tensionN] = tensionN(from + row);
    rows[row * WIDTH + COLUMN.phase] = 2;
  }
  return {rows, count};
}

function aBuffer(most: number): PointBuffer {
  return {rows: new Float64Array(most), values: new Float64Array(most)};
}

describe('TraceStore', () => {
  it('keeps tension to the bit while it grows', () => {
    const store = new TraceStore();
    const value = (row: number): number => 200 + row / 3;

    for (let from = 0; from < 20_000; from += 37) store.append(rowsOf(37, value, from));

    expect(store.count).toBe(37 * Math.ceil(20_000 / 37));
    for (const row of [0, 5999, 6000, 12_345]) expect(store.at(row, 'tensionN')).toBe(value(row));
    expect(store.at(100, 'phase')).toBe(2);
  });

  it('has no value outside its rows', () => {
    const store = new TraceStore();
    store.append(rowsOf(10, () => 1));

    expect(store.at(-1, 'tensionN')).toBeNaN();
    expect(store.at(10, 'tensionN')).toBeNaN();
  });

  it('gives the rows themselves when they fit', () => {
    const store = new TraceStore();
    store.append(rowsOf(50, (row) => row));
    const buffer = aBuffer(100);

    const count = store.fill('tensionN', 10, 20, buffer);

    expect([...buffer.rows.subarray(0, count)]).toEqual([10, 11, 12, 13, 14, 15, 16, 17, 18, 19]);
    expect([...buffer.values.subarray(0, count)]).toEqual([10, 11, 12, 13, 14, 15, 16, 17, 18, 19]);
  });

  for (const rows of [6000, 30_000, 360_000]) {
    it(`loses no single peak or dip among ${rows} rows`, () => {
      const store = new TraceStore();
      const peakAt = Math.floor(rows * 0.61);
      const dipAt = Math.floor(rows * 0.27);
      store.append(rowsOf(rows, (row) => (row === peakAt ? 900 : row === dipAt ? -50 : 200)));
      const buffer = aBuffer(4100);

      const count = store.fill('tensionN', 0, rows, buffer);

      const values = buffer.values.subarray(0, count);
      expect(count).toBeLessThanOrEqual(4100);
      expect(Math.max(...values)).toBe(900);
      expect(Math.min(...values)).toBe(-50);
      expect(Math.abs(buffer.rows[values.indexOf(900)]! - peakAt)).toBeLessThanOrEqual(256);
    });
  }

  it('shows the newest rows of a long run, also before their stretch is full', () => {
    const store = new TraceStore();
    store.append(rowsOf(6003, (row) => (row === 6002 ? 777 : 1)));
    const buffer = aBuffer(1000);

    const count = store.fill('tensionN', 0, 6003, buffer);

    expect(Math.max(...buffer.values.subarray(0, count))).toBe(777);
  });

  it('keeps the order of a ramp within a stretch', () => {
    const store = new TraceStore();
    store.append(rowsOf(6000, (row) => 6000 - row));
    const buffer = aBuffer(1000);

    const count = store.fill('tensionN', 0, 6000, buffer);

    const values = [...buffer.values.subarray(0, count)];
    expect(values).toEqual(values.toSorted((a, b) => b - a));
  });

  it('is empty again after it was cleared', () => {
    const store = new TraceStore();
    store.append(rowsOf(100, () => 5));

    store.clear();

    expect(store.count).toBe(0);
    expect(store.fill('tensionN', 0, 100, aBuffer(200))).toBe(0);
  });
});
