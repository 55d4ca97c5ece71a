import {type Settings} from '../scenario/settings';
import * as at from './controller-state';

/** What one tick of the PID works with, beside the settings. */
export interface PidInput {
  /** Controlled variable and its set point [% of range, or of the dancer's travel]. */
  readonly y: number;
  readonly r: number;
  /** 1: more output raises y (load cell); −1: a rising y asks for more output (dancer). */
  readonly sense: 1 | -1;
  /** Gain in force [%/%]. */
  readonly kp: number;
  /** Factor of the radius compensation. */
  readonly compensation: number;
  /** Output added for the inertia of a slowing roll [%]. */
  readonly assistPct: number;
}

/** One tick of the PID in ISA standard form; returns the output [%] and leaves I, d and the limit in the state. */
export function pidOutput(state: Float64Array, settings: Settings, input: PidInput): number {
  const {y, r, sense, kp, compensation, assistPct} = input;
  const {sampleS, tiS, tdS, outMinPct, outMaxPct} = settings;
  const proportional = sense * kp * (settings.setPointWeight * r - y);

  if (state[at.CLOSED] === 0) {
    // the loop closes: no derivative kick, and I such that the output goes on from the one in force
    state[at.LAST_Y] = y;
    state[at.DERIVATIVE] = 0;
    if (settings.bumpless)
      state[at.INTEGRAL] = (state[at.OUTPUT]! - assistPct) / compensation - proportional;
    state[at.CLOSED] = 1;
  }

  if (tdS > 0) {
    const filterS = tdS / settings.derivativeN;
    const change = y - state[at.LAST_Y]!;
    state[at.DERIVATIVE] = (filterS * state[at.DERIVATIVE]! + change) / (filterS + sampleS);
  } else state[at.DERIVATIVE] = 0;
  state[at.LAST_Y] = y;

  const derivative = sense * kp * tdS * state[at.DERIVATIVE]!;
  const wanted = compensation * (proportional + state[at.INTEGRAL]! - derivative) + assistPct;
  const output = clampOutput(settings, wanted);
  state[at.LIMIT] = wanted >= outMaxPct ? 1 : wanted <= outMinPct ? -1 : 0;

  if (tiS > 0) {
    const error = sense * (r - y);
    let step = ((kp * sampleS) / tiS) * error;
    if (settings.antiWindup === 'conditional') {
      if ((wanted >= outMaxPct && error > 0) || (wanted <= outMinPct && error < 0)) step = 0;
    } else if (settings.antiWindup === 'backCalculation')
      step += (sampleS / settings.trackingS!) * (output - wanted);
    state[at.INTEGRAL]! += step;
  }
  return output;
}

/** Within the output limits in force. */
export function clampOutput({outMinPct, outMaxPct}: Settings, output: number): number {
  return Math.min(Math.max(output, outMinPct), outMaxPct);
}
