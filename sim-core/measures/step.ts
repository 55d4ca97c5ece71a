import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** A change of target at the span's beginning [N]. */
export interface Step {
  readonly fromN: number;
  readonly toN: number;
}

/** Farthest beyond the new target in the direction of the change, % of the change; null for no change. */
export function overshootPct(rows: TraceRows, {from, to}: Span, step: Step): Measured | null {
  const change = step.toN - step.fromN;
  if (change === 0 || Math.min(to, rows.count) <= from) return null;
  let found: Measured = {value: 0, place: placeOf(from, from, 'tension')};
  for (let row = from; row < Math.min(to, rows.count); row++) {
    const beyond = (100 * (rows.at(row, 'tensionN') - step.toN)) / change;
    if (beyond > found.value) found = {value: beyond, place: placeOf(row, row, 'tension')};
  }
  return found;
}

/** Time from 10 to 90 % of the change [s]; null when 90 % is not reached. */
export function riseTimeS(
  rows: TraceRows,
  {from, to}: Span,
  step: Step,
  sampleS: number,
): Measured | null {
  const change = step.toN - step.fromN;
  if (change === 0) return null;
  let tenth: number | null = null;
  for (let row = from; row < Math.min(to, rows.count); row++) {
    const share = (rows.at(row, 'tensionN') - step.fromN) / change;
    if (share >= 0.1) tenth ??= row;
    if (share >= 0.9 && tenth !== null) {
      return {value: (row - tenth) * sampleS, place: placeOf(tenth, row, 'tension')};
    }
  }
  return null;
}
