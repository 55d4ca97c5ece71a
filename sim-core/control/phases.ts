import {type Settings} from '../scenario/settings';
import * as at from './controller-state';

/** Numbers of the phases, as in a trace. */
export const STANDSTILL = 0;
export const STARTING = 1;
export const RUNNING = 2;
export const STOPPING = 3;
export const MANUAL = 4;

/** A time counts as passed within this of a tick [s]. */
const GRACE_S = 1e-9;

/** What the line's commands and its movement mean for the phases in one tick. */
export interface LineNews {
  /** Whether a run command came in this tick. */
  readonly ran: boolean;
  /** The first stop command of this tick that no later run took back. */
  readonly stopped: 'stop' | 'fastStop' | null;
  readonly stands: boolean;
}

/** Moves on through the phases, each check once and in this order: mode, run, stop, hold, ramp, standing. */
export function nextPhase(
  state: Float64Array,
  settings: Settings,
  tick: number,
  line: LineNews,
  closesNow: boolean,
): void {
  const {sampleS} = settings;
  if (settings.mode === 'manual') state[at.PHASE] = MANUAL;
  else if (state[at.PHASE] === MANUAL) state[at.PHASE] = line.stands ? STANDSTILL : RUNNING;

  if (line.ran) begin(state, settings, tick);
  if (line.stopped !== null && isOneOf(state[at.PHASE]!, STARTING, RUNNING)) {
    state[at.PHASE] = STOPPING;
    state[at.STOP_AT] = tick;
    state[at.STOP_IS_FAST] = line.stopped === 'fastStop' ? 1 : 0;
    state[at.STOP_OUTPUT] = state[at.OUTPUT]!;
  }

  if (state[at.PHASE] === STARTING && state[at.RAMPING] === 0) {
    const isOver = hasPassed(tick - state[at.RUN_AT]!, sampleS, settings.startHoldS);
    if (settings.startOutputPct === null || closesNow || isOver) {
      state[at.RAMPING] = 1;
      state[at.RAMP_AT] = tick;
    }
  }
  if (state[at.PHASE] === STARTING && state[at.RAMPING] === 1)
    if (hasPassed(tick - state[at.RAMP_AT]!, sampleS, settings.startRampS))
      state[at.PHASE] = RUNNING;

  if (!line.stands) return;
  if (state[at.PHASE] === RUNNING) state[at.PHASE] = STANDSTILL;
  if (state[at.PHASE] === STOPPING && !holds(state, settings, tick)) state[at.PHASE] = STANDSTILL;
}

/** Whether the stop-hold of the present stop still lasts; gain and time are read live. */
export function holds(state: Float64Array, settings: Settings, tick: number): boolean {
  return !hasPassed(tick - state[at.STOP_AT]!, settings.sampleS, holdTime(state, settings));
}

/** Time of the stop-hold in force [s]. */
export function holdTime(state: Float64Array, settings: Settings): number {
  if (state[at.STOP_IS_FAST] === 0) return settings.stopHoldS;
  return settings.fastStopHoldS ?? settings.stopHoldS;
}

/** Factor of the stop-hold in force. */
export function holdGain(state: Float64Array, settings: Settings): number {
  if (state[at.STOP_IS_FAST] === 0) return settings.stopHoldGain;
  return settings.fastStopGain ?? settings.stopHoldGain;
}

/** A run command: a start at standstill, straight to running while stopping, else no new phase. */
function begin(state: Float64Array, settings: Settings, tick: number): void {
  if (state[at.PHASE] === STOPPING) state[at.PHASE] = RUNNING;
  if (state[at.PHASE] !== STANDSTILL) return;
  const skips = settings.startRampS === 0 && settings.startOutputPct === null;
  state[at.PHASE] = skips ? RUNNING : STARTING;
  state[at.RUN_AT] = tick;
  state[at.RAMP_AT] = tick;
  state[at.RAMPING] = settings.startOutputPct === null ? 1 : 0;
}

function hasPassed(ticks: number, sampleS: number, timeS: number): boolean {
  return ticks * sampleS >= timeS - GRACE_S;
}

function isOneOf(phase: number, one: number, other: number): boolean {
  return phase === one || phase === other;
}
