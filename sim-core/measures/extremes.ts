import {type TraceColumn} from '../run/trace';
import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** Highest true tension [N] in the span; null when the span is empty. */
export function peak(rows: TraceRows, span: Span): Measured | null {
  return extreme(rows, span, 'tensionN', 1);
}

/** Lowest true tension [N] in the span; null when the span is empty. */
export function least(rows: TraceRows, span: Span): Measured | null {
  return extreme(rows, span, 'tensionN', -1);
}

/** Highest brake temperature [°C]; null when the span is empty. */
export function hottest(rows: TraceRows, span: Span): Measured | null {
  return extreme(rows, span, 'brakeC', 1);
}

function extreme(
  rows: TraceRows,
  {from, to}: Span,
  column: TraceColumn,
  sign: 1 | -1,
): Measured | null {
  let found: Measured | null = null;
  for (let row = from; row < Math.min(to, rows.count); row++) {
    const value = rows.at(row, column);
    if (found !== null && sign * value <= sign * found.value) continue;
    found = {value, place: placeOf(row, row, 'tension')};
  }
  return found;
}
