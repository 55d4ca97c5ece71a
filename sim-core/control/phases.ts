import * as at from './controller-state';
import * as seen from './seen';
import * as set from './tuning';

/** Numbers of the phases, as in a trace. */
export const STANDSTILL = 0;
export const STARTING = 1;
export const RUNNING = 2;
export const STOPPING = 3;
export const MANUAL = 4;

/** A time counts as passed within this of a tick [s]. */
const GRACE_S = 1e-9;

/**
 * Moves on through the phases, each check once and in this order: mode, run, stop, hold, ramp, standing.
 * `isTaut` says that the input lies above the tension at which a start closes its loop.
 */
export function nextPhase(
  state: Float64Array,
  tuning: Float64Array,
  news: Float64Array,
  isTaut: boolean,
): void {
  const stands = news[seen.STANDS] === 1;
  const tick = news[seen.TICK]!;
  if (tuning[set.IS_MANUAL] === 1) state[at.PHASE] = MANUAL;
  else if (state[at.PHASE] === MANUAL) state[at.PHASE] = stands ? STANDSTILL : RUNNING;

  if (news[seen.RAN] === 1) begin(state, tuning, tick);
  if (news[seen.STOPPED] !== seen.NO_STOP) halt(state, news, tick);

  if (state[at.PHASE] === STARTING && state[at.RAMPING] === 0) {
    const isOver = hasPassed(state[at.RUN_AT]!, tick, tuning, tuning[set.START_HOLD_S]!);
    if (!set.hasStartOutput(tuning) || isTaut || isOver) {
      state[at.RAMPING] = 1;
      state[at.RAMP_AT] = tick;
    }
  }
  if (state[at.PHASE] === STARTING && state[at.RAMPING] === 1)
    if (hasPassed(state[at.RAMP_AT]!, tick, tuning, tuning[set.START_RAMP_S]!))
      state[at.PHASE] = RUNNING;

  if (!stands) return;
  if (state[at.PHASE] === RUNNING) state[at.PHASE] = STANDSTILL;
  if (state[at.PHASE] === STOPPING && !holds(state, tuning, tick)) state[at.PHASE] = STANDSTILL;
}

/** Whether the stop-hold of the present stop still lasts; gain and time are read live. */
export function holds(state: Float64Array, tuning: Float64Array, tick: number): boolean {
  return !hasPassed(state[at.STOP_AT]!, tick, tuning, holdTime(state, tuning));
}

/** Time of the stop-hold in force [s]. */
export function holdTime(state: Float64Array, tuning: Float64Array): number {
  return state[at.STOP_IS_FAST] === 1 ? tuning[set.FAST_HOLD_S]! : tuning[set.STOP_HOLD_S]!;
}

/** Factor of the stop-hold in force. */
export function holdGain(state: Float64Array, tuning: Float64Array): number {
  return state[at.STOP_IS_FAST] === 1 ? tuning[set.FAST_GAIN]! : tuning[set.STOP_GAIN]!;
}

/** A run command: a start at standstill, straight to running while stopping, else no new phase. */
function begin(state: Float64Array, tuning: Float64Array, tick: number): void {
  if (state[at.PHASE] === STOPPING) state[at.PHASE] = RUNNING;
  if (state[at.PHASE] !== STANDSTILL) return;
  const hasOutput = set.hasStartOutput(tuning);
  state[at.PHASE] = tuning[set.START_RAMP_S] === 0 && !hasOutput ? RUNNING : STARTING;
  state[at.RUN_AT] = tick;
  state[at.RAMP_AT] = tick;
  state[at.RAMPING] = hasOutput ? 0 : 1;
}

/** A stop command; one that comes while stopping only renews the line's ramp. */
function halt(state: Float64Array, news: Float64Array, tick: number): void {
  if (state[at.PHASE] !== STARTING && state[at.PHASE] !== RUNNING) return;
  state[at.PHASE] = STOPPING;
  state[at.STOP_AT] = tick;
  state[at.STOP_IS_FAST] = news[seen.STOPPED] === seen.FAST_STOP ? 1 : 0;
  state[at.STOP_OUTPUT] = state[at.OUTPUT]!;
}

function hasPassed(since: number, tick: number, tuning: Float64Array, timeS: number): boolean {
  return (tick - since) * tuning[set.SAMPLE_S]! >= timeS - GRACE_S;
}
