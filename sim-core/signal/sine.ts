export const PI = 3.141592653589793;
export const TWO_PI = 6.283185307179586;

const PER_QUARTER = 0.6366197723675814;
const QUARTER_HIGH = 1.5707963267341256;
const QUARTER_LOW = 6.077100506506192e-11;

/** Sine of an angle [rad], the same bits in every browser. Error below 1e-15 for angles up to 10⁵. */
export function sine(angle: number): number {
  const quarter = Math.floor(angle * PER_QUARTER + 0.5);
  const rest = angle - quarter * QUARTER_HIGH - quarter * QUARTER_LOW;
  const turn = quarter - 4 * Math.floor(quarter / 4);
  const value = turn % 2 === 0 ? sineNearZero(rest) : cosineNearZero(rest);
  return turn < 2 ? value : -value;
}

/** Cosine of an angle [rad]. */
export function cosine(angle: number): number {
  const quarter = Math.floor(angle * PER_QUARTER + 0.5);
  const rest = angle - quarter * QUARTER_HIGH - quarter * QUARTER_LOW;
  const turn = quarter - 4 * Math.floor(quarter / 4);
  const value = turn % 2 === 0 ? cosineNearZero(rest) : sineNearZero(rest);
  return turn === 0 || turn === 3 ? value : -value;
}

/** Sine and cosine of one angle [rad] at places 0 and 1 of `into`: the values of the functions above. */
export function sineAndCosine(angle: number, into: Float64Array): void {
  const quarter = Math.floor(angle * PER_QUARTER + 0.5);
  const rest = angle - quarter * QUARTER_HIGH - quarter * QUARTER_LOW;
  const turn = quarter - 4 * Math.floor(quarter / 4);
  const near = sineNearZero(rest);
  const far = cosineNearZero(rest);
  into[0] = turn === 0 ? near : turn === 1 ? far : turn === 2 ? -near : -far;
  into[1] = turn === 0 ? far : turn === 1 ? -near : turn === 2 ? -far : near;
}

/** Series to x¹⁷ for |x| <= π/4. */
function sineNearZero(x: number): number {
  const s = x * x;
  let sum = 1 - s / 272;
  sum = 1 - (s / 210) * sum;
  sum = 1 - (s / 156) * sum;
  sum = 1 - (s / 110) * sum;
  sum = 1 - (s / 72) * sum;
  sum = 1 - (s / 42) * sum;
  sum = 1 - (s / 20) * sum;
  sum = 1 - (s / 6) * sum;
  return x * sum;
}

/** Series to x¹⁶ for |x| <= π/4. */
function cosineNearZero(x: number): number {
  const s = x * x;
  let sum = 1 - s / 240;
  sum = 1 - (s / 182) * sum;
  sum = 1 - (s / 132) * sum;
  sum = 1 - (s / 90) * sum;
  sum = 1 - (s / 56) * sum;
  sum = 1 - (s / 30) * sum;
  sum = 1 - (s / 12) * sum;
  return 1 - (s / 2) * sum;
}
