/**
 * Frequency [Hz] at which a sine of `signalHz` shows when it is sampled at `sampleHz`, 0 … half of that:
 * the distance to the nearest whole multiple of the sampling frequency (sampling theorem). Both > 0.
 */
export function aliasHz(signalHz: number, sampleHz: number): number {
  if (!(signalHz >= 0) || !(sampleHz > 0))
    throw new RangeError(`A signal of ${signalHz} Hz sampled at ${sampleHz} Hz has no alias.`);
  return Math.abs(signalHz - sampleHz * Math.round(signalHz / sampleHz));
}
