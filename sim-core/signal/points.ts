/** Straight lines through points (x rising), flat outside the first and the last. */
export class Points {
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Slope after each point; 0 after the last. */
  private readonly slope: Float64Array;

  constructor(points: readonly (readonly [number, number])[]) {
    this.x = Float64Array.from(points, ([x]) => x);
    this.y = Float64Array.from(points, ([, y]) => y);
    this.slope = new Float64Array(points.length);
    for (let i = 0; i + 1 < points.length; i++)
      this.slope[i] = (this.y[i + 1]! - this.y[i]!) / (this.x[i + 1]! - this.x[i]!);
  }

  /** Which piece `x` lies on: −1 before the first point, else the place of the point at or before it. */
  piece(x: number): number {
    let i = this.x.length - 1;
    while (i >= 0 && x < this.x[i]!) i--;
    return i;
  }

  /** Value at `x`, known to lie on `piece`. */
  on(piece: number, x: number): number {
    if (piece < 0) return this.y[0]!;
    return this.y[piece]! + this.slope[piece]! * (x - this.x[piece]!);
  }

  /** Straight line of a piece: value = start + rise·x. */
  start(piece: number): number {
    return piece < 0 ? this.y[0]! : this.y[piece]! - this.slope[piece]! * this.x[piece]!;
  }

  rise(piece: number): number {
    return piece < 0 ? 0 : this.slope[piece]!;
  }

  at(x: number): number {
    return this.on(this.piece(x), x);
  }
}
