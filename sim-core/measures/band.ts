import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** A tolerance band around a target [N]. */
export interface Band {
  readonly lowestN: number;
  readonly highestN: number;
}

/** Longest time a mean is taken over [s]: a crawling roll has no turn worth waiting for. */
const LONGEST_TURN_S = 5;

/** Share of the span's rows inside the band, 0 … 1; null when the span is empty. */
export function shareInTolerance(rows: TraceRows, span: Span, band: Band): Measured | null {
  const to = Math.min(span.to, rows.count);
  if (to <= span.from) return null;
  let inside = 0;
  for (let row = span.from; row < to; row++) {
    const tensionN = rows.at(row, 'tensionN');
    if (tensionN >= band.lowestN && tensionN <= band.highestN) inside++;
  }
  return {value: inside / (to - span.from), place: placeOf(span.from, to - 1, 'tension')};
}

/**
 * Time from the span's beginning until the once-per-turn mean of tension stays in the band [s]; null when it
 * ends outside ("not yet") or the span is empty. The mean leaves out a ripple that no setting can cure.
 */
export function onTargetBy(
  rows: TraceRows,
  span: Span,
  band: Band,
  sampleS: number,
): Measured | null {
  const to = Math.min(span.to, rows.count);
  let lastOutside = span.from - 1;
  const means = turnMeans(rows, {from: span.from, to}, sampleS);
  means.forEach((mean, place) => {
    if (mean < band.lowestN || mean > band.highestN) lastOutside = span.from + place;
  });
  if (to <= span.from || lastOutside === to - 1) return null;
  const row = lastOutside + 1;
  return {value: (row - span.from) * sampleS, place: placeOf(row, row, 'tension')};
}

/** Mean of tension over the last turn of the roll, at each row of the span. */
function turnMeans(rows: TraceRows, {from, to}: Span, sampleS: number): number[] {
  const sums = [0];
  const means: number[] = [];
  for (let row = from; row < to; row++) {
    const seen = row - from + 1;
    sums.push(sums[seen - 1]! + rows.at(row, 'tensionN'));
    const speed = Math.abs(rows.at(row, 'rollRadps'));
    const turnS = speed > 0 ? Math.min(LONGEST_TURN_S, 6.283185307179586 / speed) : 0;
    const length = Math.max(1, Math.min(seen, Math.round(turnS / sampleS)));
    means.push((sums[seen]! - sums[seen - length]!) / length);
  }
  return means;
}
