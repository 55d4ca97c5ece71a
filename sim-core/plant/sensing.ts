import {type Scenario} from '../scenario/scenario';
import * as now from './evaluation';

/** Readings a load cell's amplifier can give, as shares of its range. */
export const LEAST_SHARE = -0.1;
export const GREATEST_SHARE = 1.2;

/** Fills in what of the sensing never changes. */
export function fixSensing(n: Float64Array, {sensing}: Scenario): void {
  if (sensing.kind === 'loadCell') {
    n[now.RANGE] = sensing.rangeN;
    n[now.NOISE] = sensing.noiseN ?? 0;
    n[now.PER_FILTER] = sensing.filterS > 0 ? 1 / sensing.filterS : 0;
  } else {
    n[now.TRAVEL] = sensing.travelM;
    n[now.PER_MASS] = 1 / sensing.massKg;
    n[now.DAMPING] = sensing.dampingNsPerM;
  }
}

/** Signal of the cell [N] for a force on its roller [N]. */
export function cellSignal(zeroN: number, spanPct: number, forceN: number): number {
  return zeroN + (spanPct / 100) * forceN;
}

/** One sample [N]: the filtered signal with its noise, within what the amplifier can give. */
export function cellSample(n: Float64Array, filteredN: number, normalDraw: number): number {
  const noisy = filteredN + n[now.NOISE]! * normalDraw;
  const range = n[now.RANGE]!;
  return Math.min(Math.max(noisy, LEAST_SHARE * range), GREATEST_SHARE * range);
}
