import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** A loop counts from this length [m] and for this long [s]: less is the web's own breathing. */
const COUNTED_FROM_M = 0.005;
const COUNTED_FROM_S = 0.05;

/** Longest web above the straight path [m], counted from 5 mm and 50 ms; 0 when there was none. */
export function loopM(rows: TraceRows, span: Span, sampleS: number): Measured | null {
  const to = Math.min(span.to, rows.count);
  if (to <= span.from) return null;
  const least = Math.round(COUNTED_FROM_S / sampleS);
  let longest: Measured = {value: 0, place: placeOf(span.from, to - 1, 'tension')};
  let began: number | null = null;
  let most = 0;
  for (let row = span.from; row <= to; row++) {
    const slackM = row < to ? rows.at(row, 'slackM') : 0;
    if (slackM >= COUNTED_FROM_M) {
      began ??= row;
      most = Math.max(most, slackM);
      continue;
    }
    if (began !== null && row - began >= least && most > longest.value) {
      longest = {value: most, place: placeOf(began, row - 1, 'tension')};
    }
    began = null;
    most = 0;
  }
  return longest;
}

/** Web paid out after the line stood [m]: the roll ran on. */
export function runOnM(rows: TraceRows, span: Span, sampleS: number): Measured | null {
  const to = Math.min(span.to, rows.count);
  let stood: number | null = null;
  let paidOut = 0;
  for (let row = span.from; row < to; row++) {
    if (rows.at(row, 'lineMps') > 0) continue;
    stood ??= row;
    paidOut += rows.at(row, 'rollRadps') * rows.at(row, 'radiusM') * sampleS;
  }
  return stood === null ? null : {value: paidOut, place: placeOf(stood, to - 1, 'line')};
}
