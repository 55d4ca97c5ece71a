import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** Sum of the output's changes per second [%/s]; null for a span under two rows. */
export function brakeMovement(rows: TraceRows, span: Span, sampleS: number): Measured | null {
  const to = Math.min(span.to, rows.count);
  if (to - span.from < 2) return null;
  let moved = 0;
  for (let row = span.from + 1; row < to; row++) {
    moved += Math.abs(rows.at(row, 'outputPct') - rows.at(row - 1, 'outputPct'));
  }
  return {
    value: moved / ((to - span.from - 1) * sampleS),
    place: placeOf(span.from, to - 1, 'output'),
  };
}

/** Time the output lay at one of its limits [s]. */
export function timeAtLimitS(
  rows: TraceRows,
  span: Span,
  limits: {readonly lowestPct: number; readonly highestPct: number},
  sampleS: number,
): Measured | null {
  const to = Math.min(span.to, rows.count);
  if (to <= span.from) return null;
  let first: number | null = null;
  let last = span.from;
  let count = 0;
  for (let row = span.from; row < to; row++) {
    const output = rows.at(row, 'outputPct');
    if (output > limits.lowestPct && output < limits.highestPct) continue;
    first ??= row;
    last = row;
    count++;
  }
  return {value: count * sampleS, place: placeOf(first ?? span.from, last, 'output')};
}

/** Greatest output [%]. */
export function greatestOutputPct(rows: TraceRows, span: Span): Measured | null {
  let found: Measured | null = null;
  for (let row = span.from; row < Math.min(span.to, rows.count); row++) {
    const value = rows.at(row, 'outputPct');
    if (found === null || value > found.value) {
      found = {value, place: placeOf(row, row, 'output')};
    }
  }
  return found;
}
