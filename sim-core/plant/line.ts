import {type LineCommand} from '../scenario/scenario';

/** A time within this of a tick counts as that tick [s]. */
const GRACE_S = 1e-9;

/** Places in the line's part of the state. */
const EVER_RUN = 0;
const TARGET = 1; // speed asked for [m/s]
const RAMP_END = 2; // [s]
const COUNT = 3; // segments kept
const ROUND_S = 4; // rounding time [s]
const SEGMENTS = 5; // each: start [s], speed at its start [m/s], slope [m/s²]

/** Most pieces of the rounded speed within one tick: a ramp's end, and edges leaving the mean. */
const MOST_PIECES = 8;

/**
 * Speed of the nip. The straight profile is a list of segments; the drive rounds it to the mean over the
 * last `roundS`. `openTick` lays the rounded speed out as exact parabolas, cut where the profile bends.
 */
export class Line {
  /** Pieces of the open tick: end within the tick [s], start, and v = c0 + c1·s + c2·s² from the start. */
  pieces = 0;
  readonly ends = new Float64Array(MOST_PIECES);
  readonly starts = new Float64Array(MOST_PIECES);
  readonly c0 = new Float64Array(MOST_PIECES);
  readonly c1 = new Float64Array(MOST_PIECES);
  readonly c2 = new Float64Array(MOST_PIECES);

  static size(roundS: number, sampleS: number): number {
    return SEGMENTS + 3 * (2 * Math.floor(roundS / sampleS + 1) + 6);
  }

  constructor(private readonly state: Float64Array) {}

  reset(roundS: number): void {
    this.state.fill(0);
    this.state[ROUND_S] = roundS;
    this.state[COUNT] = 1;
    this.state[SEGMENTS] = -1e9; // at rest since ever
  }

  /** Speed the last command asked for [m/s]. */
  get targetMps(): number {
    return this.state[TARGET]!;
  }

  /** Speed at which the line ends up once what was commanded is over [m/s]. */
  get lastMps(): number {
    return this.state[SEGMENTS + 3 * (this.state[COUNT]! - 1) + 1]!;
  }

  /** Whether the rounded speed stays at `lastMps` from `t` [s] on, until the next command. */
  isSteady(t: number): boolean {
    const {state} = this;
    const last = SEGMENTS + 3 * (state[COUNT]! - 1);
    return state[last + 2] === 0 && state[last]! <= t - state[ROUND_S]! + GRACE_S;
  }

  /** Whether the line is at zero all through the open tick. */
  isAtRest(): boolean {
    return this.pieces === 1 && this.c0[0] === 0 && this.c1[0] === 0 && this.c2[0] === 0;
  }

  /** Takes a command at time `t` [s], a tick. */
  command(t: number, line: LineCommand): void {
    const {state} = this;
    const target = line.command === 'run' ? line.speedMps : 0;
    const place = this.segmentAt(t);
    const now = this.straightAt(place, t);
    // what was planned beyond this tick is forgotten, also what an earlier command of the same tick planned
    let count = place + 1;
    if (state[SEGMENTS + 3 * place]! >= t - GRACE_S) count = place;
    if (line.rampS > 0) {
      this.put(count++, t, now, (target - now) / line.rampS);
      this.put(count++, t + line.rampS, target, 0);
    } else this.put(count++, t, target, 0);
    state[COUNT] = count;
    state[TARGET] = target;
    state[RAMP_END] = t + line.rampS;
    if (line.command === 'run') state[EVER_RUN] = 1;
  }

  /** Whether ramp and rounding of the last command are over and the line is at zero. */
  stands(t: number): boolean {
    const {state} = this;
    if (state[EVER_RUN] === 0) return true;
    return state[TARGET] === 0 && t >= state[RAMP_END]! + this.state[ROUND_S]! - GRACE_S;
  }

  /** Rounded speed [m/s] at `t` [s]. */
  speedAt(t: number): number {
    if (this.state[ROUND_S]! === 0) return this.straightAt(this.segmentAt(t), t);
    return this.meanBefore(t);
  }

  /** Lays out the speed of the tick that begins at `t` [s] and lasts `sampleS`. */
  openTick(t: number, sampleS: number): void {
    const {ends, state} = this;
    const roundS = state[ROUND_S]!;
    this.forget(t);
    let pieces = 0;
    for (;;) {
      const from = pieces === 0 ? 0 : ends[pieces - 1]!;
      const to = pieces === MOST_PIECES - 1 ? sampleS : this.nextBend(t, from, sampleS);
      const at = t + from;
      const place = this.segmentAt(at);
      const slope = this.state[SEGMENTS + 3 * place + 2]!;
      this.starts[pieces] = from;
      ends[pieces] = to;
      if (roundS === 0) {
        this.c0[pieces] = this.straightAt(place, at);
        this.c1[pieces] = slope;
        this.c2[pieces] = 0;
      } else {
        const old = this.segmentAt(at - roundS);
        const oldSlope = this.state[SEGMENTS + 3 * old + 2]!;
        this.c0[pieces] = this.meanBefore(at);
        this.c1[pieces] = (this.straightAt(place, at) - this.straightAt(old, at - roundS)) / roundS;
        this.c2[pieces] = (slope - oldSlope) / (2 * roundS);
      }
      pieces++;
      if (to >= sampleS) break;
    }
    this.pieces = pieces;
  }

  /** Where the profile, or the profile one rounding time ago, bends next within the tick. */
  private nextBend(t: number, after: number, sampleS: number): number {
    const {state} = this;
    const roundS = state[ROUND_S]!;
    let next = sampleS;
    const count = state[COUNT]!;
    for (let i = 0; i < count; i++) {
      const entering = state[SEGMENTS + 3 * i]! - t;
      if (entering > after + GRACE_S && entering < next - GRACE_S) next = entering;
      const leaving = entering + roundS;
      if (leaving > after + GRACE_S && leaving < next - GRACE_S) next = leaving;
    }
    return next;
  }

  private put(place: number, start: number, speed: number, slope: number): void {
    this.state[SEGMENTS + 3 * place] = start;
    this.state[SEGMENTS + 3 * place + 1] = speed;
    this.state[SEGMENTS + 3 * place + 2] = slope;
  }

  /** The segment in force at `t`; one that starts within the grace counts. */
  private segmentAt(t: number): number {
    const {state} = this;
    let place = state[COUNT]! - 1;
    while (place > 0 && state[SEGMENTS + 3 * place]! > t + GRACE_S) place--;
    return place;
  }

  private straightAt(place: number, t: number): number {
    const {state} = this;
    const at = SEGMENTS + 3 * place;
    const slope = state[at + 2]!;
    return slope === 0 ? state[at + 1]! : state[at + 1]! + slope * (t - state[at]!);
  }

  /** Mean of the straight profile over the rounding time before `t`. */
  private meanBefore(t: number): number {
    const {state} = this;
    const roundS = state[ROUND_S]!;
    const from = t - roundS;
    const count = state[COUNT]!;
    const first = this.segmentAt(from);
    let sum = 0;
    for (let i = first; i < count; i++) {
      const at = SEGMENTS + 3 * i;
      const start = i === first ? from : state[at]!;
      const end = i + 1 < count ? Math.min(t, state[at + 3]!) : t;
      if (i === first && state[at + 2] === 0 && end === t) return state[at + 1]!;
      if (end <= start) continue;
      sum += (end - start) * (state[at + 1]! + state[at + 2]! * ((start + end) / 2 - state[at]!));
    }
    return sum / roundS;
  }

  /** Drops segments that no mean will look at again. */
  private forget(t: number): void {
    const {state} = this;
    const oldest = this.segmentAt(t - this.state[ROUND_S]! - 2 * GRACE_S);
    if (oldest === 0) return;
    const count = state[COUNT]!;
    state.copyWithin(SEGMENTS, SEGMENTS + 3 * oldest, SEGMENTS + 3 * count);
    state[COUNT] = count - oldest;
  }
}
