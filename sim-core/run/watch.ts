import {type RunEvent} from './run';
import {PHASES} from './trace';

/** Places of the watch in the run's state. */
const SLACK_TICKS = 0;
const SLACK_ON = 1;
const SLACK_MOST = 2;
const STRETCHED = 3;
const HOT = 4;
const LIMIT_TICKS = 5;
const LIMIT_ON = 6; // −1, 1: counted at the lower, upper limit
const AT_STOP = 7;
const PHASE = 8;
export const WATCH_SIZE = 9;

/** Slack and an output at its limit count from here [m], [s]. */
const SLACK_FROM_M = 0.005;
const COUNTS_AFTER_S = 0.05;
const GRACE_S = 1e-9;

/** Most events that are kept: an endless hunt at a limit must not fill the memory. */
export const MOST_EVENTS = 20_000;

/** What the watch looks at after a tick. */
export interface Watched {
  readonly slackM: number;
  /** Strain of the web. */
  readonly strain: number;
  readonly brakeC: number;
  readonly isAtStop: boolean;
  /** −1, 0, 1: PID output at its lower limit, at none, at its upper. */
  readonly limit: number;
  readonly limitPct: number;
}

/** Notices what happens by itself. */
export class Watch {
  readonly events: RunEvent[] = [];

  constructor(
    private readonly state: Float64Array,
    private readonly sampleS: number,
    /** Strain from which on the web counts as stretched. */
    readonly stretchLimit: number,
    readonly hotC: number,
  ) {}

  /** The controller's phase in tick `tick`. */
  phase(tick: number, phase: number): void {
    const {state} = this;
    if (state[PHASE] === phase) return;
    state[PHASE] = phase;
    this.add({kind: 'phase', atTick: tick, atS: tick * this.sampleS, phase: PHASES[phase]!});
  }

  /** The plant at the end of tick `tick`. */
  look(tick: number, seen: Watched): void {
    const {state} = this;
    this.slack(tick, seen.slackM);
    this.limit(tick, seen);

    const isStretched = seen.strain > this.stretchLimit;
    if (isStretched && state[STRETCHED] === 0) this.say(tick, 'stretched', seen.strain * 100);
    state[STRETCHED] = isStretched ? 1 : 0;

    const isHot = seen.brakeC > this.hotC;
    if (isHot && state[HOT] === 0) this.say(tick, 'brakeHot', seen.brakeC);
    state[HOT] = isHot ? 1 : 0;

    if (seen.isAtStop && state[AT_STOP] === 0) this.say(tick, 'dancerStop');
    state[AT_STOP] = seen.isAtStop ? 1 : 0;
  }

  /** Whether nothing is going on that could end or is being counted. */
  isIdle(): boolean {
    const {state} = this;
    return (
      state[SLACK_TICKS] === 0 &&
      state[LIMIT_TICKS] === 0 &&
      state[LIMIT_ON] === 0 &&
      state[STRETCHED] === 0 &&
      state[HOT] === 0 &&
      state[AT_STOP] === 0
    );
  }

  /** Adds one event. */
  add(event: RunEvent): void {
    if (this.events.length < MOST_EVENTS) this.events.push(event);
  }

  private slack(tick: number, slackM: number): void {
    const {state} = this;
    if (slackM < SLACK_FROM_M) {
      if (state[SLACK_ON] === 1) this.say(tick, 'slackEnded', state[SLACK_MOST]);
      state[SLACK_ON] = 0;
      state[SLACK_TICKS] = 0;
      state[SLACK_MOST] = 0;
      return;
    }
    state[SLACK_TICKS]!++;
    state[SLACK_MOST] = Math.max(state[SLACK_MOST]!, slackM);
    if (state[SLACK_ON] === 1 || !this.counts(state[SLACK_TICKS]!)) return;
    state[SLACK_ON] = 1;
    this.say(tick, 'slackBegan', slackM);
  }

  private limit(tick: number, {limit, limitPct}: Watched): void {
    const {state} = this;
    if (state[LIMIT_ON] !== 0 && state[LIMIT_ON] !== limit) {
      state[LIMIT_ON] = 0;
      this.say(tick, 'outputLimitEnded');
    }
    if (limit === 0) {
      state[LIMIT_TICKS] = 0;
      return;
    }
    // counted with its side as sign, so that a jump from limit to limit counts anew
    state[LIMIT_TICKS] = state[LIMIT_TICKS]! * limit > 0 ? state[LIMIT_TICKS]! + limit : limit;
    if (state[LIMIT_ON] !== 0 || !this.counts(state[LIMIT_TICKS] * limit)) return;
    state[LIMIT_ON] = limit;
    this.say(tick, 'outputLimitBegan', limitPct);
  }

  private counts(ticks: number): boolean {
    return ticks * this.sampleS >= COUNTS_AFTER_S - GRACE_S;
  }

  private say(tick: number, kind: RunEvent['kind'], value?: number): void {
    const event = {kind, atTick: tick, atS: (tick + 1) * this.sampleS};
    this.add(value === undefined ? event : {...event, value});
  }
}
