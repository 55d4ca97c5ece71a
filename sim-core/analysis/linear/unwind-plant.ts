import {Matrix} from 'ml-matrix';
import {complex, type Complex, over, plus, times} from './complex';
import {firstOrderLag} from './process-models';
import {series, seriesWithBoth, type StateSpace} from './state-space';

/** Where the stand runs: what the roll and span are at that moment. */
export interface UnwindPoint {
  readonly radiusM: number;
  /** Inertia of roll and core [kg·m²]. */
  readonly inertiaKgM2: number;
  /** Web stiffness EA [N]. */
  readonly stiffnessN: number;
  readonly spanM: number;
  /** Line speed [m/s], >= 0. */
  readonly lineMps: number;
  /** Tension in the span [N], >= 0. */
  readonly tensionN: number;
  /** Tension the roll was wound with [N], >= 0. */
  readonly woundTensionN: number;
  /** Loss time of the web [s]. */
  readonly lossTimeS: number;
  /** Viscous drag of the bearings [N·m·s], with that of a falling brake curve when it has one. */
  readonly viscousNmS: number;
}

/** What stands between the controller's output and the roll, and between the web and the controller. */
export interface BrakeAndCell {
  /** Brake torque per output [N·m/%] where the stand runs. */
  readonly torquePerPct: number;
  /** Lag of the brake [s]. */
  readonly lagS: number;
  /** Filter of the load cell [s]. */
  readonly filterS: number;
}

/** Roll and span as an oscillator: gain·(1 + loss·s)/(s²/ωn² + 2·ζ·s/ωn + 1). */
export interface UnwindMode {
  /** Tension per brake torque at rest [N per N·m], near 1/R. */
  readonly gainNPerNm: number;
  readonly naturalRadps: number;
  /** Damping ratio ζ; below 0 the roll and the span swing up. */
  readonly dampingFactor: number;
}

/**
 * Stiffness [N] with which the span answers to the roll: EA·(1 + ε)²/(1 + ε₁). It follows from the span's exact
 * equation dℓ/dt = v₁/(1 + ε₁) − v/(1 + ε), ε = L/ℓ − 1, linearised where it stands still; the literature's EA − T₁
 * is its first order in ε₁ alone. It differs from EA by twice the strain, 0.1 % in a paper web at 200 N/m.
 */
export function effectiveStiffnessN(point: UnwindPoint): number {
  const {stiffnessN, tensionN, woundTensionN} = point;
  const stretch = 1 + tensionN / stiffnessN;
  return (stiffnessN * stretch * stretch) / (1 + woundTensionN / stiffnessN);
}

/**
 * Brake torque [N·m] to tension [N] around a point: states are the roll's speed [rad/s] and the elastic part of
 * the tension [N]. The same as F(s) of `torqueResponse`; more torque, more tension.
 */
export function torqueToTension(point: UnwindPoint): StateSpace {
  const {radiusM, inertiaKgM2, spanM, lineMps, lossTimeS, viscousNmS} = point;
  const perSpeed = (effectiveStiffnessN(point) * radiusM) / spanM; // tension lost per roll speed, a second
  const leaves = lineMps / spanM;
  const share = 1 - lossTimeS * leaves;
  const c = new Matrix([[-lossTimeS * perSpeed, share]]);
  const a = new Matrix([
    [(-viscousNmS - radiusM * lossTimeS * perSpeed) / inertiaKgM2, (radiusM * share) / inertiaKgM2],
    [-perSpeed, -leaves],
  ]);
  return {a, b: new Matrix([[-1 / inertiaKgM2], [0]]), c, d: new Matrix([[0]])};
}

/**
 * dT/dM at a frequency [rad/s]:
 * (1/R)·EA'·(1 + τ·s)/((L·s + v)·(m·s + β) + EA'·(1 + τ·s)), m = J/R², β = b/R² (torque balance of the roll and mass
 * balance of the span).
 */
export function torqueResponse(point: UnwindPoint, radps: number): Complex {
  const {radiusM, inertiaKgM2, spanM, lineMps, lossTimeS, viscousNmS} = point;
  const stiffness = effectiveStiffnessN(point);
  const square = radiusM * radiusM;
  const web = complex(stiffness, stiffness * lossTimeS * radps);
  const span = complex(lineMps, spanM * radps);
  const roll = complex(viscousNmS / square, (inertiaKgM2 / square) * radps);
  return over(times(complex(1 / radiusM), web), plus(times(span, roll), web));
}

/** The oscillator that roll and span are. */
export function unwindMode(point: UnwindPoint): UnwindMode {
  const {radiusM, inertiaKgM2, spanM, lineMps, lossTimeS, viscousNmS} = point;
  const stiffness = effectiveStiffnessN(point);
  const mass = inertiaKgM2 / (radiusM * radiusM);
  const drag = viscousNmS / (radiusM * radiusM);
  const spring = stiffness + lineMps * drag;
  const damping = lineMps * mass + spanM * drag + stiffness * lossTimeS;
  return {
    gainNPerNm: stiffness / (radiusM * spring),
    naturalRadps: Math.sqrt(spring / (spanM * mass)),
    dampingFactor: damping / (2 * Math.sqrt(spanM * mass * spring)),
  };
}

/** Viscous drag [N·m·s] below which roll and span swing up by themselves; negative. */
export function leastViscousNmS(point: UnwindPoint): number {
  const {radiusM, inertiaKgM2, spanM, lineMps, lossTimeS} = point;
  const square = radiusM * radiusM;
  const others = lineMps * (inertiaKgM2 / square) + effectiveStiffnessN(point) * lossTimeS;
  return (-others * square) / spanM;
}

/**
 * Controller output [%] to what the controller measures [N] (output 0) and to the true tension [N] (output 1):
 * brake, roll and span, load cell. Dead time is given to `sampled`.
 */
export function outputToMeasured(point: UnwindPoint, chain: BrakeAndCell): StateSpace {
  const toTension = series(firstOrderLag(chain.torquePerPct, chain.lagS), torqueToTension(point));
  return seriesWithBoth(toTension, firstOrderLag(1, chain.filterS));
}
