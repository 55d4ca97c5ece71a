/**
 * The second-order system ωn²/(s² + 2·ζ·ωn·s + ωn²) and its unit step; ζ is its damping ratio. Textbook results,
 * e.g. Ogata, Modern Control Engineering, section 5-3 (from memory). Those of the overshoot need 0 <= ζ < 1 and
 * throw RangeError otherwise.
 */

/** First peak beyond the final value, % of the step. */
export function overshootOfDamping(damping: number): number {
  return 100 * Math.exp(-Math.PI * swingOf(damping));
}

/** Damping ratio whose step overshoots by this much, 0 < overshoot <= 100 %. */
export function dampingOfOvershoot(overshootPct: number): number {
  if (!(overshootPct > 0) || !(overshootPct <= 100))
    throw new RangeError(`No damping ratio gives an overshoot of ${overshootPct} %.`);
  const log = Math.log(overshootPct / 100) / Math.PI;
  return Math.abs(log) / Math.sqrt(1 + log * log);
}

/** Ratio of successive peaks on the same side of the final value, one period apart: the overshoot squared. */
export function decayRatioOfDamping(damping: number): number {
  return Math.exp(-2 * Math.PI * swingOf(damping));
}

/** Damping ratio of a decay ratio, 0 < ratio <= 1; 0.25 is quarter decay. */
export function dampingOfDecayRatio(ratio: number): number {
  return dampingOfOvershoot(100 * Math.sqrt(ratio));
}

/** Time of the first peak [s] at a natural frequency [rad/s]. */
export function peakTimeS(damping: number, naturalRadps: number): number {
  swingOf(damping);
  return Math.PI / dampedRadps(damping, naturalRadps);
}

/** Frequency of the swing [rad/s]: that of the natural one, less what damping takes. */
export function dampedRadps(damping: number, naturalRadps: number): number {
  swingOf(damping);
  return naturalRadps * Math.sqrt(1 - damping * damping);
}

/** Greatest gain over frequency, 1 when there is no resonance (ζ >= 1/√2). */
export function resonancePeak(damping: number): number {
  return damping >= Math.SQRT1_2 ? 1 : 1 / (2 * damping * Math.sqrt(1 - damping * damping));
}

/** ζ/√(1 − ζ²): how much of its amplitude a swing loses, per radian. */
function swingOf(damping: number): number {
  if (!(damping >= 0) || !(damping < 1))
    throw new RangeError(`With a damping ratio of ${damping} a step does not swing.`);
  return damping / Math.sqrt(1 - damping * damping);
}
