import {type Settings} from '../scenario/settings';

/**
 * Places of the settings in the controller's typed array: every tick reads them, and an object would have
 * another layout for every document. What is off is NaN, which no comparison holds for.
 */
export const SAMPLE_S = 0;
export const KP = 1;
export const TI = 2;
export const TD = 3;
export const DERIVATIVE_N = 4;
export const WEIGHT = 5;
export const OUT_MIN = 6;
export const OUT_MAX = 7;
export const TARGET = 8; // SP [N]
export const IS_MANUAL = 9;
export const MANUAL_PCT = 10;
export const START_RAMP_S = 11;
export const START_FRACTION = 12;
export const STANDSTILL_PCT = 13;
export const STOP_HOLD_S = 14;
export const STOP_GAIN = 15;
export const FAST_HOLD_S = 16; // as the stop's when the document gives none
export const FAST_GAIN = 17;
export const PER_REFERENCE = 18; // 1/radiusRefM, 0 without radius compensation
export const ASSIST = 19; // [%]
export const RATE = 20; // [N/s]
export const START_PCT = 21; // NaN: no start output
export const CLOSE_ABOVE = 22; // [N]
export const START_HOLD_S = 23;
export const SOURCE = 24; // of the radius, see the numbers below
export const CALIPER = 25; // [m]
export const ZERO_ADJUST = 26; // [N]
export const INPUT_GAIN = 27; // sign × span adjustment, 1 as it comes
export const INPUT_FILTER_S = 28;
export const WINDUP = 29;
export const TRACKING_S = 30;
export const IS_BUMPLESS = 31;
export const OUT_RATE = 32; // [%/s], 0: none
export const OUT_STEP = 33; // [%], 0: none
export const TUNING_SIZE = 34;

/** Sources of the radius. */
export const TRUE_RADIUS = 0;
export const COUNTED = 1;
export const RATIO = 2;

/** Kinds of anti-windup. */
export const CONDITIONAL = 0;
export const BACK_CALCULATION = 1;
export const NO_ANTI_WINDUP = 2;

const SOURCES = {true: TRUE_RADIUS, counted: COUNTED, ratio: RATIO} as const;
const WINDUPS = {
  conditional: CONDITIONAL,
  backCalculation: BACK_CALCULATION,
  none: NO_ANTI_WINDUP,
} as const;

/** Writes the settings in force. */
export function tune(tuning: Float64Array, settings: Settings): void {
  tuning[SAMPLE_S] = settings.sampleS;
  tuning[KP] = settings.kp;
  tuning[TI] = settings.tiS;
  tuning[TD] = settings.tdS;
  tuning[DERIVATIVE_N] = settings.derivativeN;
  tuning[WEIGHT] = settings.setPointWeight;
  tuning[OUT_MIN] = settings.outMinPct;
  tuning[OUT_MAX] = settings.outMaxPct;
  tuning[TARGET] = settings.setPointN;
  tuning[IS_MANUAL] = settings.mode === 'manual' ? 1 : 0;
  tuning[MANUAL_PCT] = settings.manualPct;
  tuning[START_RAMP_S] = settings.startRampS;
  tuning[START_FRACTION] = settings.startFraction;
  tuning[STANDSTILL_PCT] = settings.standstillPct;
  tuning[STOP_HOLD_S] = settings.stopHoldS;
  tuning[STOP_GAIN] = settings.stopHoldGain;
  tuning[FAST_HOLD_S] = settings.fastStopHoldS ?? settings.stopHoldS;
  tuning[FAST_GAIN] = settings.fastStopGain ?? settings.stopHoldGain;
  tuning[PER_REFERENCE] = settings.radiusCompensation ? 1 / settings.radiusRefM! : 0;
  tuning[ASSIST] = settings.inertiaAssistPct;
  tuning[RATE] = settings.setPointRateNps;
  tuning[START_PCT] = settings.startOutputPct ?? NaN;
  tuning[CLOSE_ABOVE] = settings.closeAboveN;
  tuning[START_HOLD_S] = settings.startHoldS;
  tuning[SOURCE] = SOURCES[settings.radiusSource];
  tuning[CALIPER] = settings.caliperEnteredM;
  tuning[ZERO_ADJUST] = settings.zeroAdjustN;
  tuning[INPUT_GAIN] = (settings.inputSign * settings.spanAdjustPct) / 100;
  tuning[INPUT_FILTER_S] = settings.inputFilterS;
  tuning[WINDUP] = WINDUPS[settings.antiWindup];
  tuning[TRACKING_S] = settings.trackingS ?? NaN;
  tuning[IS_BUMPLESS] = settings.bumpless ? 1 : 0;
  tuning[OUT_RATE] = settings.outRatePctPerS;
  tuning[OUT_STEP] = settings.outStepPct;
}

/** Whether a start begins with an output of its own. */
export function hasStartOutput(tuning: Float64Array): boolean {
  return tuning[START_PCT]! >= 0;
}

/** What the brake gets of an output [%]: the nearest multiple of the resolution. */
export function applied(tuning: Float64Array, output: number): number {
  const step = tuning[OUT_STEP]!;
  return step > 0 ? step * Math.floor(output / step + 0.5) : output;
}

/** Within the output limits in force. */
export function clampOutput(tuning: Float64Array, output: number): number {
  return Math.min(Math.max(output, tuning[OUT_MIN]!), tuning[OUT_MAX]!);
}
