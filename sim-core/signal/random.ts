import {logarithm} from './logarithm';

/** Numbers of state that one generator keeps. */
export const RANDOM_SIZE = 4;

/**
 * Generator xoshiro128** (D. Blackman, S. Vigna, "Scrambled linear pseudorandom number generators", 2021).
 * `state` holds its four 32-bit words as whole numbers.
 */
export function nextWord(state: Float64Array): number {
  const s0 = state[0]! | 0;
  const s1 = state[1]! | 0;
  let s2 = state[2]! | 0;
  let s3 = state[3]! | 0;
  const word = Math.imul(rotate(Math.imul(s1, 5), 7), 9) >>> 0;
  s2 ^= s0;
  s3 ^= s1;
  state[0] = (s0 ^ s3) >>> 0;
  state[1] = (s1 ^ s2) >>> 0;
  state[2] = (s2 ^ (s1 << 9)) >>> 0;
  state[3] = rotate(s3, 11) >>> 0;
  return word;
}

/** Fills the state from one 32-bit seed: four steps of a counter with golden-ratio stride, each mixed. */
export function seedWords(state: Float64Array, seed: number): void {
  let counter = seed | 0;
  for (let i = 0; i < RANDOM_SIZE; i++) {
    counter = (counter + 0x9e3779b9) | 0;
    let word = counter;
    word = Math.imul(word ^ (word >>> 16), 0x21f0aaad);
    word = Math.imul(word ^ (word >>> 15), 0x735a2d97);
    state[i] = (word ^ (word >>> 15)) >>> 0;
  }
}

/** One draw from the standard normal distribution: one word of the generator, put through its quantiles. */
export function nextNormal(state: Float64Array): number {
  return normalQuantile((nextWord(state) + 0.5) / 4294967296);
}

/**
 * Quantile of the standard normal distribution, about 1 part in 10¹⁶.
 * M. J. Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37 (1988) 477–484.
 */
export function normalQuantile(probability: number): number {
  const q = probability - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return q * ratio(r, CENTRE_TOP, CENTRE_BOTTOM);
  }
  const tail = q < 0 ? probability : 1 - probability;
  const depth = Math.sqrt(-logarithm(tail));
  const size =
    depth <= 5
      ? ratio(depth - 1.6, MIDDLE_TOP, MIDDLE_BOTTOM)
      : ratio(depth - 5, FAR_TOP, FAR_BOTTOM);
  return q < 0 ? -size : size;
}

function rotate(word: number, bits: number): number {
  return (word << bits) | (word >>> (32 - bits));
}

/** Ratio of two polynomials, highest power first. */
function ratio(x: number, top: readonly number[], bottom: readonly number[]): number {
  let a = 0;
  let b = 0;
  for (let i = 0; i < top.length; i++) {
    a = a * x + top[i]!;
    b = b * x + bottom[i]!;
  }
  return a / b;
}

const CENTRE_TOP = [
  2.5090809287301226727e3, 3.3430575583588128105e4, 6.7265770927008700853e4,
  4.5921953931549871457e4, 1.3731693765509461125e4, 1.9715909503065514427e3,
  1.3314166789178437745e2, 3.387132872796366608,
];
const CENTRE_BOTTOM = [
  5.226495278852545925e3, 2.8729085735721942674e4, 3.930789580009271061e4, 2.1213794301586595867e4,
  5.3941960214247511077e3, 6.871870074920579083e2, 4.2313330701600911252e1, 1,
];
const MIDDLE_TOP = [
  7.7454501427834140764e-4, 2.27238449892691845833e-2, 2.4178072517745061177e-1,
  1.27045825245236838258, 3.64784832476320460504, 5.7694972214606914055, 4.6303378461565452959,
  1.42343711074968357734,
];
const MIDDLE_BOTTOM = [
  1.05075007164441684324e-9, 5.475938084995344946e-4, 1.51986665636164571966e-2,
  1.4810397642748007459e-1, 6.8976733498510000455e-1, 1.6763848301838038494, 2.05319162663775882187,
  1,
];
const FAR_TOP = [
  2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.2426609473880784386e-3,
  2.6532189526576123093e-2, 2.9656057182850489123e-1, 1.7848265399172913358, 5.4637849111641143699,
  6.6579046435011037772,
];
const FAR_BOTTOM = [
  2.04426310338993978564e-15, 1.4215117583164458887e-7, 1.8463183175100546818e-5,
  7.868691311456132591e-4, 1.48753612908506148525e-2, 1.3692988092273580531e-1,
  5.9983220655588793769e-1, 1,
];
