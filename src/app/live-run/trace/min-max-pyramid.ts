/** Rows that one step of each level covers. */
const SPANS = [4, 16, 64, 256] as const;
const FIRST_STEPS = 1024;

interface Level {
  lows: Float32Array;
  highs: Float32Array;
  /** 1 where the lowest came first: drawn in this order a ramp stays a ramp. */
  lowFirst: Uint8Array;
  /** Steps closed so far. */
  steps: number;
  low: number;
  high: number;
  lowAt: number;
  highAt: number;
  rows: number;
}

/** Points to draw, filled anew at each drawing so that no frame makes garbage. */
export interface PointBuffer {
  readonly rows: Float64Array;
  readonly values: Float64Array;
}

/** Lowest and highest value of every 4, 16, 64 and 256 rows: what a chart needs of a long run. */
export class MinMaxPyramid {
  private readonly levels: readonly Level[] = SPANS.map(() => ({
    lows: new Float32Array(FIRST_STEPS),
    highs: new Float32Array(FIRST_STEPS),
    lowFirst: new Uint8Array(FIRST_STEPS),
    steps: 0,
    low: Infinity,
    high: -Infinity,
    lowAt: 0,
    highAt: 0,
    rows: 0,
  }));

  /** The finest level that gives at most about `most` points; null: the rows themselves. */
  static levelFor(rows: number, most: number): number | null {
    if (rows <= most) return null;
    const level = SPANS.findIndex((span) => (2 * rows) / span <= most);
    return level < 0 ? SPANS.length - 1 : level;
  }

  add(value: number): void {
    for (let place = 0; place < SPANS.length; place++) {
      const level = this.levels[place]!;
      if (value < level.low) {
        level.low = value;
        level.lowAt = level.rows;
      }
      if (value > level.high) {
        level.high = value;
        level.highAt = level.rows;
      }
      level.rows++;
      if (level.rows === SPANS[place]) close(level);
    }
  }

  /** Fills two points a step, the lowest and the highest, in the order they came; returns how many. */
  fill(place: number, from: number, to: number, into: PointBuffer): number {
    const span = SPANS[place]!;
    const level = this.levels[place]!;
    const last = Math.min(level.steps, Math.ceil(to / span));
    let count = 0;
    for (let step = Math.floor(from / span); step < last; step++) {
      const isLowFirst = level.lowFirst[step] === 1;
      count = put(
        into,
        count,
        step * span,
        span,
        isLowFirst ? level.lows[step]! : level.highs[step]!,
        isLowFirst ? level.highs[step]! : level.lows[step]!,
      );
    }
    if (level.rows === 0 || to <= level.steps * span) return count;
    const isLowFirst = level.lowAt <= level.highAt;
    const {low, high} = level;
    return put(
      into,
      count,
      level.steps * span,
      level.rows,
      isLowFirst ? low : high,
      isLowFirst ? high : low,
    );
  }
}

function put(
  {rows, values}: PointBuffer,
  count: number,
  row: number,
  span: number,
  first: number,
  second: number,
): number {
  if (count + 2 > rows.length) return count;
  rows[count] = row;
  values[count] = first;
  rows[count + 1] = row + span / 2;
  values[count + 1] = second;
  return count + 2;
}

function close(level: Level): void {
  if (level.steps === level.lows.length) grow(level);
  level.lows[level.steps] = level.low;
  level.highs[level.steps] = level.high;
  level.lowFirst[level.steps] = level.lowAt <= level.highAt ? 1 : 0;
  level.steps++;
  level.low = Infinity;
  level.high = -Infinity;
  level.rows = 0;
}

function grow(level: Level): void {
  const room = 2 * level.lows.length;
  const lows = new Float32Array(room);
  const highs = new Float32Array(room);
  const lowFirst = new Uint8Array(room);
  lows.set(level.lows);
  highs.set(level.highs);
  lowFirst.set(level.lowFirst);
  Object.assign(level, {lows, highs, lowFirst});
}
