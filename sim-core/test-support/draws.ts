/**
 * Numbers drawn from a seed: Mulberry32, a public-domain generator in common use (from memory). The same in every
 * browser, so that a spec that draws its cases always draws the same ones.
 */
export class Draws {
  constructor(private seed: number) {}

  /** Evenly in 0 … 1. */
  share(): number {
    this.seed = (this.seed + 0x6d2b79f5) | 0;
    let bits = Math.imul(this.seed ^ (this.seed >>> 15), 1 | this.seed);
    bits = (bits + Math.imul(bits ^ (bits >>> 7), 61 | bits)) ^ bits;
    return ((bits ^ (bits >>> 14)) >>> 0) / 4294967296;
  }

  between(lowest: number, highest: number): number {
    return lowest + (highest - lowest) * this.share();
  }

  chance(share: number): boolean {
    return this.share() < share;
  }

  whole(lowest: number, highest: number): number {
    return Math.floor(this.between(lowest, highest + 1));
  }
}
