/**
 * Numbers drawn from a seed, the same in every run, so that whatever fails can be run again. A Weyl sequence
 * through a 32-bit mixer of two multiplications (constants from memory, after Wellons' search for low bias).
 */
export class Draws {
  private word: number;

  constructor(seed: number) {
    this.word = Math.imul(seed, 0x85ebca6b) >>> 0;
  }

  /** 0 … 1, without 1. */
  share(): number {
    this.word = (this.word + 0x9e3779b9) >>> 0;
    let mixed = this.word;
    mixed = Math.imul(mixed ^ (mixed >>> 16), 0x21f0aaad);
    mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
    return ((mixed ^ (mixed >>> 15)) >>> 0) / 4294967296;
  }

  between(lowest: number, highest: number): number {
    return Math.min(highest, lowest + this.share() * (highest - lowest));
  }

  /** A whole number, both ends included. */
  whole(lowest: number, highest: number): number {
    return lowest + Math.floor(this.share() * (highest - lowest + 1));
  }

  /** Whether something with this probability happens. */
  chance(probability: number): boolean {
    return this.share() < probability;
  }

  pick<T>(list: readonly T[]): T {
    if (list.length === 0) throw new RangeError('nothing to pick from');
    return list[this.whole(0, list.length - 1)]!;
  }
}
