import {type Scenario} from '../scenario/scenario';
import {PI} from '../signal/sine';

/** What of a roll never changes, prepared once. */
export interface RollShape {
  /** Core radius squared [m²]. */
  readonly coreSquare: number;
  /** Thickness over π [m]: R² = core² + this × wound length. */
  readonly perLength: number;
  /** Inertia J = atZero + perFourth·R⁴ [kg·m²]. */
  readonly atZero: number;
  /** [kg/m²] */
  readonly perFourth: number;
}

export function rollShape({web, roll}: Scenario): RollShape {
  const coreSquare = roll.coreRadiusM * roll.coreRadiusM;
  const perFourth = 0.5 * PI * web.densityKgM3 * web.widthM;
  return {
    coreSquare,
    perLength: web.thicknessM / PI,
    atZero: roll.coreInertiaKgM2 - perFourth * (coreSquare * coreSquare),
    perFourth,
  };
}

/** Relaxed length [m] on a roll of this mean radius [m]. */
export function woundLength(shape: RollShape, radiusM: number): number {
  return (radiusM * radiusM - shape.coreSquare) / shape.perLength;
}

/** Mean radius [m] of a roll that holds this relaxed length [m]. */
export function meanRadius(shape: RollShape, lengthM: number): number {
  return Math.sqrt(shape.coreSquare + shape.perLength * lengthM);
}

/** Inertia [kg·m²] at a mean radius squared [m²]. */
export function inertia(shape: RollShape, squareM2: number): number {
  return shape.atZero + shape.perFourth * (squareM2 * squareM2);
}

/** What an out-of-round roll adds to the mean radius [m], from the cosine of its angle. */
export function outOfRound(eccentricityM: number, ovalM: number, cosine: number): number {
  return eccentricityM * cosine + ovalM * (2 * cosine * cosine - 1);
}
