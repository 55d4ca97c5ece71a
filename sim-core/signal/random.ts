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
  const word = Math.imul(rotated(Math.imul(s1, 5), 7), 9) >>> 0;
  s2 ^= s0;
  s3 ^= s1;
  state[0] = (s0 ^ s3) >>> 0;
  state[1] = (s1 ^ s2) >>> 0;
  state[2] = (s2 ^ (s1 << 9)) >>> 0;
  state[3] = rotated(s3, 11) >>> 0;
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
  return normalOf(nextWord(state));
}

/** The draw that a word of the generator stands for. */
export function normalOf(word: number): number {
  return normalQuantile((word + 0.5) / 4294967296);
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

export function rotated(word: number, bits: number): number {
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
  2509.0809287301227, 33430.57558358813, 67265.7709270087, 45921.95393154987, 13731.69376550946,
  1971.5909503065513, 133.14166789178438, 3.3871328727963665,
];
const CENTRE_BOTTOM = [
  5226.495278852546, 28729.085735721943, 39307.89580009271, 21213.794301586597, 5394.196021424751,
  687.1870074920579, 42.31333070160091, 1,
];
const MIDDLE_TOP = [
  0.0007745450142783414, 0.022723844989269184, 0.2417807251774506, 1.2704582524523684,
  3.6478483247632045, 5.769497221460691, 4.630337846156546, 1.4234371107496835,
];
const MIDDLE_BOTTOM = [
  1.0507500716444169e-9, 0.0005475938084995345, 0.015198666563616457, 0.14810397642748008,
  0.6897673349851, 1.6763848301838038, 2.053191626637759, 1,
];
const FAR_TOP = [
  2.0103343992922881e-7, 0.000027115555687434876, 0.0012426609473880784, 0.026532189526576124,
  0.29656057182850487, 1.7848265399172913, 5.463784911164114, 6.657904643501103,
];
const FAR_BOTTOM = [
  2.0442631033899397e-15, 1.421511758316446e-7, 0.000018463183175100548, 0.0007868691311456133,
  0.014875361290850615, 0.1369298809227358, 0.599832206555888, 1,
];
