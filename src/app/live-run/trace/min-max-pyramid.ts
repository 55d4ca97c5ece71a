/** Rows that one step of each level covers. */
const SPANS = [16, 256] as const;

interface Level {
  readonly lows: number[];
  readonly highs: number[];
  /** Whether the lowest came first: drawn in this order a ramp stays a ramp. */
  readonly lowFirst: boolean[];
  low: number;
  high: number;
  lowAt: number;
  highAt: number;
  rows: number;
}

/** Lowest and highest value of every 16 and every 256 rows: what a chart needs of a long run. */
export class MinMaxPyramid {
  private readonly levels: readonly Level[] = SPANS.map(() => ({
    lows: [],
    highs: [],
    lowFirst: [],
    lowAt: 0,
    highAt: 0,
    low: Infinity,
    high: -Infinity,
    rows: 0,
  }));

  /** The coarsest level is taken only when a finer one would give more than `most` points; null: the rows themselves. */
  static levelFor(rows: number, most: number): number | null {
    if (rows <= most) return null;
    return (2 * rows) / SPANS[0] <= most ? 0 : 1;
  }

  add(value: number): void {
    this.levels.forEach((level, place) => {
      if (value < level.low) {
        level.low = value;
        level.lowAt = level.rows;
      }
      if (value > level.high) {
        level.high = value;
        level.highAt = level.rows;
      }
      level.rows++;
      if (level.rows < SPANS[place]!) return;
      level.lows.push(level.low);
      level.highs.push(level.high);
      level.lowFirst.push(level.lowAt <= level.highAt);
      level.low = Infinity;
      level.high = -Infinity;
      level.rows = 0;
    });
  }

  /** Two points a step, the lowest and the highest, in the order they came. */
  points(level: number, from: number, to: number): {rows: number[]; values: number[]} {
    const span = SPANS[level]!;
    const {lows, highs, lowFirst, low, high, lowAt, highAt, rows: open} = this.levels[level]!;
    const rows: number[] = [];
    const values: number[] = [];
    const put = (step: number, lowest: number, highest: number, isLowFirst: boolean): void => {
      rows.push(step * span, step * span + span / 2);
      if (isLowFirst) values.push(lowest, highest);
      else values.push(highest, lowest);
    };
    const last = Math.min(lows.length, Math.ceil(to / span));
    for (let step = Math.floor(from / span); step < last; step++)
      put(step, lows[step]!, highs[step]!, lowFirst[step]!);
    if (open > 0 && to > lows.length * span) put(lows.length, low, high, lowAt <= highAt);
    return {rows, values};
  }
}
