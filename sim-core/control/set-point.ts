import {type Settings} from '../scenario/settings';
import * as at from './controller-state';
import {STARTING} from './phases';

/** Moves the set point now [N] by one tick: along the start ramp, or toward the target at its rate. */
export function moveSetPoint(state: Float64Array, settings: Settings, tick: number): void {
  const {setPointN, startFraction, startRampS, setPointRateNps, sampleS} = settings;
  if (state[at.PHASE] === STARTING) {
    const isRamping = state[at.RAMPING] === 1;
    const share = isRamping ? ((tick - state[at.RAMP_AT]!) * sampleS) / startRampS : 0;
    state[at.SET_POINT] = setPointN * (startFraction + (1 - startFraction) * share);
    return;
  }
  if (setPointRateNps === 0) {
    state[at.SET_POINT] = setPointN;
    return;
  }
  const most = setPointRateNps * sampleS;
  const now = state[at.SET_POINT]!;
  state[at.SET_POINT] = now + Math.min(Math.max(setPointN - now, -most), most);
}
