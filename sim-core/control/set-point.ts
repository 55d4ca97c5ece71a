import * as at from './controller-state';
import {STARTING} from './phases';
import * as set from './tuning';

/** Moves the set point now [N] by one tick: along the start ramp, or toward the target at its rate. */
export function moveSetPoint(state: Float64Array, tuning: Float64Array, tick: number): void {
  const target = tuning[set.TARGET]!;
  if (state[at.PHASE] === STARTING) {
    const from = tuning[set.START_FRACTION]!;
    const sinceS = (tick - state[at.RAMP_AT]!) * tuning[set.SAMPLE_S]!;
    const share = state[at.RAMPING] === 1 ? sinceS / tuning[set.START_RAMP_S]! : 0;
    state[at.SET_POINT] = target * (from + (1 - from) * share);
    return;
  }
  if (tuning[set.RATE] === 0) {
    state[at.SET_POINT] = target;
    return;
  }
  const most = tuning[set.RATE]! * tuning[set.SAMPLE_S]!;
  const now = state[at.SET_POINT]!;
  state[at.SET_POINT] = now + Math.min(Math.max(target - now, -most), most);
}
