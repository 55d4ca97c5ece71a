import {type LoadCellParams} from '../scenario/scenario';

/** Readings a load cell's amplifier can give, as shares of its range. */
const LEAST_SHARE = -0.1;
const GREATEST_SHARE = 1.2;

/** Signal of the cell [N] for a force on its roller [N]. */
export function cellSignal(zeroN: number, spanPct: number, forceN: number): number {
  return zeroN + (spanPct / 100) * forceN;
}

/** One sample [N]: the filtered signal with its noise, within what the amplifier can give. */
export function cellSample(cell: LoadCellParams, filteredN: number, normalDraw: number): number {
  const noisy = filteredN + (cell.noiseN ?? 0) * normalDraw;
  return Math.min(Math.max(noisy, LEAST_SHARE * cell.rangeN), GREATEST_SHARE * cell.rangeN);
}
