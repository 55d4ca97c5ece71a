import {type RunHash} from './log';

/** Odd factors, from the finalizers of MurmurHash3 (A. Appleby, public domain). */
export const MIX_A = 0x85ebca6b;
export const MIX_B = 0xc2b2ae35;

/** Two 32-bit numbers kept over every state of a run: a fingerprint of all its bits, no secret. */
export class Fingerprint {
  private readonly number = new Float64Array(1);
  private readonly bits = new Uint32Array(this.number.buffer);

  /** `state` holds the two numbers; the caller keeps, saves and loads it. */
  constructor(private readonly state: Float64Array) {}

  static readonly size = 2;

  reset(): void {
    this.state[0] = 0x6a09e667;
    this.state[1] = 0xbb67ae85;
  }

  /**
   * Mixes in the bits of every number, two words each: one goes into either half, and at the end the halves into
   * one another. Each step can be undone, so two states that differ in one word never meet. `QuietTicks` has
   * the same formula in its loop.
   */
  mixAll(words: Uint32Array): void {
    let a = this.state[0]! | 0;
    let b = this.state[1]! | 0;
    for (let i = 0; i < words.length; i += 2) {
      a = Math.imul(a ^ words[i]!, MIX_A);
      b = Math.imul(b ^ words[i + 1]!, MIX_B);
      a ^= a >>> 15;
      b ^= b >>> 13;
    }
    a = (a + b) | 0;
    this.state[0] = a >>> 0;
    this.state[1] = b >>> 0;
  }

  /** Mixes in one number. */
  mix(value: number): void {
    this.number[0] = value;
    this.mixAll(this.bits);
  }

  text(): RunHash {
    return `${hex(this.state[0]!)}${hex(this.state[1]!)}`;
  }
}

function hex(word: number): string {
  return word.toString(16).padStart(8, '0');
}
