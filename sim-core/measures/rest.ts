import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** Mean tension over the span's last second [N]: what was left at rest before the next command. */
export function tensionAtRest(rows: TraceRows, span: Span, sampleS: number): Measured | null {
  const to = Math.min(span.to, rows.count);
  const from = Math.max(span.from, to - Math.round(1 / sampleS));
  if (to <= from) return null;
  let sum = 0;
  for (let row = from; row < to; row++) sum += rows.at(row, 'tensionN');
  return {value: sum / (to - from), place: placeOf(from, to - 1, 'tension')};
}
