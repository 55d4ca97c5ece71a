const LN2 = 0.6931471805599453;

/** Natural logarithm of a positive number, the same bits in every browser. Error below 1e-15 relative. */
export function logarithm(value: number): number {
  let mantissa = value;
  let doublings = 0;
  while (mantissa < 0.7071067811865476) {
    mantissa *= 2;
    doublings--;
  }
  while (mantissa > 1.4142135623730951) {
    mantissa *= 0.5;
    doublings++;
  }
  const z = (mantissa - 1) / (mantissa + 1); // ln m = 2·(z + z³/3 + z⁵/5 + …), |z| <= 0.1716
  const square = z * z;
  let sum = 0;
  for (let odd = 25; odd >= 1; odd -= 2) sum = sum * square + 1 / odd;
  return doublings * LN2 + 2 * z * sum;
}
