/**
 * A span between two rolls of given speed in the linear form of the web handling literature,
 * L·dT/dt = EA·(v₂ − v₁) + T₁·v₁ − T·v₂, right to the size of the strain; and the exact steady state beside it.
 * `entering` is where the web comes from, `leaving` where it goes.
 */
export interface SpanPoint {
  /** Web stiffness EA [N], > 0. */
  readonly stiffnessN: number;
  /** Length of the span [m], > 0. */
  readonly spanM: number;
  /** Tension the web enters with [N]. */
  readonly enteringN: number;
  readonly enteringMps: number;
  /** Speed it leaves at [m/s], > 0 but where said otherwise. */
  readonly leavingMps: number;
}

/** Time constant [s]; Infinity at rest: the tension then stays where it is. */
export function spanTimeS({spanM, leavingMps}: SpanPoint): number {
  return spanM / leavingMps;
}

/** Steady tension [N] of the linear form. */
export function linearSteadyN(point: SpanPoint): number {
  const {stiffnessN, enteringN, enteringMps, leavingMps} = point;
  return (stiffnessN * (leavingMps - enteringMps) + enteringN * enteringMps) / leavingMps;
}

/** Steady tension [N] without linearising: 1 + ε = (1 + ε₁)·v₂/v₁; never below 0. */
export function exactSteadyN(point: SpanPoint): number {
  const {stiffnessN, enteringN, enteringMps, leavingMps} = point;
  const stretch = (1 + enteringN / stiffnessN) * (leavingMps / enteringMps);
  return Math.max(0, stiffnessN * (stretch - 1));
}

/** Speed to leave at [m/s] for a steady tension [N] in the linear form. */
export function leavingSpeedFor(
  tensionN: number,
  {stiffnessN, enteringN, enteringMps}: Omit<SpanPoint, 'leavingMps'>,
): number {
  return ((stiffnessN - enteringN) * enteringMps) / (stiffnessN - tensionN);
}

/** Tension [N] of the linear form a time [s] after it was `fromN`, with speeds and entering tension held since. */
export function linearTensionAfter(point: SpanPoint, fromN: number, timeS: number): number {
  if (point.leavingMps === 0)
    return fromN + ((point.enteringN - point.stiffnessN) * point.enteringMps * timeS) / point.spanM;
  const steadyN = linearSteadyN(point);
  return steadyN + (fromN - steadyN) * Math.exp(-timeS / spanTimeS(point));
}
