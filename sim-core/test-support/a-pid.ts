import {sampled, type StateSpace} from '../analysis/index';
import * as at from '../control/controller-state';
import {pidOutput} from '../control/pid';
import * as seen from '../control/seen';
import * as set from '../control/tuning';

/** Settings of a PID by itself, in % of output and % of range. */
export interface PidSettings {
  readonly sampleS: number;
  /** [%/%] */
  readonly gain: number;
  readonly tiS?: number;
  readonly tdS?: number;
  readonly setPointWeight?: number;
  /** Back-calculation with this time [s]; none: no anti-windup. */
  readonly trackingS?: number;
  /** Integral part it starts with [%]. */
  readonly integralPct: number;
  /** Measurement of the tick before the first [%]. */
  readonly lastPct?: number;
}

/** The engine's PID with its loop closed already; `tick` gives it set point and measurement [%]. */
export function aClosedPid(settings: PidSettings) {
  const {
    gain,
    tiS = 0,
    tdS = 0,
    setPointWeight = 1,
    trackingS,
    integralPct,
    lastPct = 0,
  } = settings;
  const state = new Float64Array(at.CONTROLLER_SIZE);
  const tuning = new Float64Array(set.TUNING_SIZE);
  const news = new Float64Array(seen.SEEN_SIZE);
  tuning[set.SAMPLE_S] = settings.sampleS;
  tuning[set.TI] = tiS;
  tuning[set.TD] = tdS;
  tuning[set.DERIVATIVE_N] = 10;
  tuning[set.WEIGHT] = setPointWeight;
  tuning[set.OUT_MAX] = 100;
  tuning[set.WINDUP] = trackingS === undefined ? set.NO_ANTI_WINDUP : set.BACK_CALCULATION;
  tuning[set.TRACKING_S] = trackingS ?? NaN;
  news[seen.GAIN] = gain;
  news[seen.COMPENSATION] = 1;
  news[seen.SENSE] = 1;
  state[at.CLOSED] = 1;
  state[at.INTEGRAL] = integralPct;
  state[at.LAST_Y] = lastPct;
  const tick = (setPointPct: number, measuredPct: number): number => {
    news[seen.R] = setPointPct;
    news[seen.Y] = measuredPct;
    return pidOutput(state, tuning, news);
  };
  return {tick, integralPct: () => state[at.INTEGRAL]};
}

/** A process for the engine's PID to control. */
export interface PidLoop {
  readonly process: StateSpace;
  readonly deadTimeS: number;
  readonly gain: number;
  readonly tiS: number;
  readonly sampleS: number;
  readonly lengthS: number;
  /** Steps at t = 0, as deviations [%]. */
  readonly setPoint?: number;
  readonly load?: number;
}

/** Middle of the ranges [%], where the loop of `runLoop` stands before t = 0. */
const MIDDLE = 50;

/**
 * The engine's PI against an exactly sampled process with dead time. Answers deviations, the first of them from
 * before the step.
 */
export function runLoop(loop: PidLoop): {readonly y: number[]; readonly u: number[]} {
  const {sampleS, setPoint = 0, load = 0} = loop;
  const {a, b, c} = sampled(loop.process, sampleS);
  const pid = aClosedPid({...loop, integralPct: MIDDLE, lastPct: MIDDLE});
  const waiting = Array.from({length: Math.round(loop.deadTimeS / sampleS)}, () => 0);
  let x = b.clone().mul(0);
  const y = [0];
  const u = [0];
  for (let k = 0; k * sampleS < loop.lengthS; k++) {
    const measured = c.mmul(x).get(0, 0);
    const output = pid.tick(MIDDLE + setPoint, MIDDLE + measured) - MIDDLE;
    y.push(measured);
    u.push(output);
    waiting.push(output + load);
    x = a.mmul(x).add(b.clone().mul(waiting.shift()!));
  }
  return {y, u};
}
