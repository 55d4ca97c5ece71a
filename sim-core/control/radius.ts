import {type Settings} from '../scenario/settings';
import {TWO_PI} from '../signal/sine';
import * as at from './controller-state';

/** The ratio of speeds is believed only above this line speed [m/s]. */
const LEAST_RATIO_MPS = 0.05;

/** Time constant of the radius from the ratio of speeds [s]. */
const RATIO_S = 1;

/** What the controller can see of the machine for its radius. */
export interface RadiusSigns {
  /** True mean radius [m], as a sensor on the roll would give. */
  readonly radiusM: number;
  readonly omegaRadps: number;
  /** Line speed without ripple [m/s]. */
  readonly lineMps: number;
}

/** Moves the radius the controller believes by one tick. */
export function moveRadius(state: Float64Array, settings: Settings, signs: RadiusSigns): void {
  const {sampleS, radiusSource} = settings;
  const {omegaRadps, lineMps} = signs;
  if (radiusSource === 'true') state[at.RADIUS] = signs.radiusM;
  else if (radiusSource === 'counted')
    state[at.RADIUS]! -= (settings.caliperEnteredM * omegaRadps * sampleS) / TWO_PI;
  else if (lineMps > LEAST_RATIO_MPS && omegaRadps > 0)
    state[at.RADIUS]! +=
      (sampleS / (sampleS + RATIO_S)) * (lineMps / omegaRadps - state[at.RADIUS]!);
}
