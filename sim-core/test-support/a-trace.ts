import {TRACE_COLUMNS, TraceBlock, type TraceColumn} from '../run/trace';

/** A trace of `count` rows whose columns follow the given functions of the row; the others are 0. */
export function aTrace(
  count: number,
  columns: Partial<Record<TraceColumn, (row: number) => number>>,
): TraceBlock {
  const block = new TraceBlock(count);
  for (let row = 0; row < count; row++) {
    TRACE_COLUMNS.forEach((name, place) => {
      block.rows[row * TRACE_COLUMNS.length + place] = columns[name]?.(row) ?? 0;
    });
    block.count++;
  }
  return block;
}
