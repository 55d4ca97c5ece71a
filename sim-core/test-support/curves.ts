/** A point of a curve: where, and how high. */
export interface Peak {
  readonly at: number;
  readonly value: number;
}

/** Local maxima of equally spaced values, each from the parabola through its three rows; `at` in rows. */
export function peaksOf(values: readonly number[]): Peak[] {
  const found: Peak[] = [];
  for (let i = 1; i + 1 < values.length; i++) {
    const [left, middle, right] = [values[i - 1]!, values[i]!, values[i + 1]!];
    if (middle < left || middle <= right) continue;
    const bend = left - 2 * middle + right;
    const shift = (left - right) / (2 * bend);
    found.push({at: i + shift, value: middle - (bend * shift * shift) / 2});
  }
  return found;
}

export function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Integral of equally spaced values by the trapezoid rule. */
export function integralOf(values: readonly number[], step: number): number {
  const inner = values.slice(1, -1).reduce((sum, value) => sum + value, 0);
  return step * (inner + (values[0]! + values.at(-1)!) / 2);
}

/** Amplitude of the sine of `turns` whole turns in equally spaced values (one Fourier coefficient). */
export function amplitudeOf(values: readonly number[], turns: number): number {
  let re = 0;
  let im = 0;
  values.forEach((value, i) => {
    const angle = (2 * Math.PI * turns * i) / values.length;
    re += value * Math.cos(angle);
    im += value * Math.sin(angle);
  });
  return (2 * Math.hypot(re, im)) / values.length;
}
