/**
 * The three forms of a PID and the units of its gain. Formulas: the control literature's standard conversions,
 * e.g. Åström and Hägglund, Advanced PID Control, 2006, chapter 3 (from memory). The derivative filter is left
 * out of all of them.
 */

/** ISA standard (ideal) form: U = Kc·(1 + 1/(Ti·s) + Td·s)·E. */
export interface StandardForm {
  /** Gain Kc, in any unit of output per input. */
  readonly gain: number;
  /** Integral time Ti [s]; Infinity for no integral part. */
  readonly integralS: number;
  /** Derivative time Td [s]; 0 for no derivative part. */
  readonly derivativeS: number;
}

/** Parallel form: U = (Kp + Ki/s + Kd·s)·E; units: those of the gain, per second, times seconds. */
export interface ParallelForm {
  readonly proportionalGain: number;
  readonly integralGain: number;
  readonly derivativeGain: number;
}

/** Series (interacting) form: U = Kc'·(1 + 1/(Ti'·s))·(1 + Td'·s)·E; units as in the standard form. */
export interface SeriesForm {
  readonly gain: number;
  readonly integralS: number;
  readonly derivativeS: number;
}

export function standardToParallel({gain, integralS, derivativeS}: StandardForm): ParallelForm {
  return {
    proportionalGain: gain,
    integralGain: gain / integralS,
    derivativeGain: gain * derivativeS,
  };
}

/** Throws RangeError without a proportional part: the standard form has none without it. */
export function parallelToStandard(form: ParallelForm): StandardForm {
  const {proportionalGain, integralGain, derivativeGain} = form;
  if (proportionalGain === 0)
    throw new RangeError('Without a proportional part there is no standard form.');
  return {
    gain: proportionalGain,
    integralS: integralGain === 0 ? Infinity : proportionalGain / integralGain,
    derivativeS: derivativeGain / proportionalGain,
  };
}

export function seriesToStandard({gain, integralS, derivativeS}: SeriesForm): StandardForm {
  const factor = 1 + derivativeS / integralS;
  return {
    gain: gain * factor,
    integralS: integralS * factor,
    derivativeS: derivativeS / factor,
  };
}

/** Null when Ti < 4·Td: the zeros of the standard form are then complex, and no series form has such. */
export function standardToSeries({gain, integralS, derivativeS}: StandardForm): SeriesForm | null {
  if (derivativeS === 0) return {gain, integralS, derivativeS}; // also for Ti = Infinity
  if (integralS < 4 * derivativeS) return null;
  if (integralS === Infinity) return {gain, integralS, derivativeS};
  const root = Math.sqrt(1 - (4 * derivativeS) / integralS);
  return {
    gain: (gain * (1 + root)) / 2,
    integralS: (integralS * (1 + root)) / 2,
    derivativeS: (integralS * (1 - root)) / 2,
  };
}

/** Gain [% output per N] of one given in % output per % of a range [N]. */
export function gainPerNewton(gainPerPct: number, rangeN: number): number {
  return (gainPerPct * 100) / rangeN;
}

/** Gain [% output per % of range] of one given in % output per N. */
export function gainPerPct(gainPerN: number, rangeN: number): number {
  return (gainPerN * rangeN) / 100;
}

/** Proportional band [%] of a gain in % output per % of range. */
export function proportionalBandPct(gainPerPctOfRange: number): number {
  return 100 / gainPerPctOfRange;
}

/** Reset rate [repeats per minute] of an integral time [s]. */
export function repeatsPerMinute(integralS: number): number {
  return 60 / integralS;
}
