import {type Measured, placeOf, type Span, type TraceRows} from './rows';

/** Integral of |target − tension| over the span (IAE) [N·s]; null when the span is empty. */
export function absoluteErrorNs(
  rows: TraceRows,
  span: Span,
  targetN: number,
  sampleS: number,
): Measured | null {
  return weighted(rows, span, sampleS, (row) => Math.abs(targetN - rows.at(row, 'tensionN')));
}

/** The same with each error weighted by the time since the span's beginning (ITAE) [N·s²]. */
export function timedErrorNs2(
  rows: TraceRows,
  span: Span,
  targetN: number,
  sampleS: number,
): Measured | null {
  return weighted(
    rows,
    span,
    sampleS,
    (row) => (row - span.from) * sampleS * Math.abs(targetN - rows.at(row, 'tensionN')),
  );
}

/** Energy the brake turned to heat, torque × roll speed summed [J]; null when the span is empty. */
export function brakeEnergyJ(rows: TraceRows, span: Span, sampleS: number): Measured | null {
  return weighted(rows, span, sampleS, (row) =>
    Math.abs(rows.at(row, 'torqueNm') * rows.at(row, 'rollRadps')),
  );
}

/**
 * Length of web [m] that passed the nip while its strain was beyond the limit. Strain is taken as tension/EA:
 * `limitN` is EA × limit [N].
 */
export function stretchedM(
  rows: TraceRows,
  span: Span,
  limitN: number,
  sampleS: number,
): Measured | null {
  return weighted(rows, span, sampleS, (row) =>
    rows.at(row, 'tensionN') > limitN ? Math.max(0, rows.at(row, 'lineMps')) : 0,
  );
}

/** Sum over the rows of the span, each for its sample period. */
function weighted(
  rows: TraceRows,
  span: Span,
  sampleS: number,
  value: (row: number) => number,
): Measured | null {
  const to = Math.min(span.to, rows.count);
  if (to <= span.from) return null;
  let sum = 0;
  for (let row = span.from; row < to; row++) sum += value(row);
  return {value: sum * sampleS, place: placeOf(span.from, to - 1, 'tension')};
}
