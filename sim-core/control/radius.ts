import {TWO_PI} from '../signal/sine';
import * as at from './controller-state';
import * as seen from './seen';
import * as set from './tuning';

/** The ratio of speeds is believed only above this line speed [m/s]. */
const LEAST_RATIO_MPS = 0.05;

/** Time constant of the radius from the ratio of speeds [s]. */
const RATIO_S = 1;

/** Moves the radius the controller believes by one tick. */
export function moveRadius(state: Float64Array, tuning: Float64Array, news: Float64Array): void {
  const sampleS = tuning[set.SAMPLE_S]!;
  const omega = news[seen.OMEGA]!;
  const line = news[seen.LINE_MPS]!;
  const source = tuning[set.SOURCE];
  if (source === set.TRUE_RADIUS) state[at.RADIUS] = news[seen.MEAN_RADIUS]!;
  else if (source === set.COUNTED)
    state[at.RADIUS]! -= (tuning[set.CALIPER]! * omega * sampleS) / TWO_PI;
  else if (line > LEAST_RATIO_MPS && omega > 0)
    state[at.RADIUS]! += (sampleS / (sampleS + RATIO_S)) * (line / omega - state[at.RADIUS]!);
}
