import {type Scenario} from '../scenario/scenario';
import {PI} from '../signal/sine';
import * as now from './evaluation';

/** Fills in what of the roll never changes. */
export function fixRoll(n: Float64Array, {web, roll}: Scenario): void {
  const coreSquare = roll.coreRadiusM * roll.coreRadiusM;
  const perFourth = 0.5 * PI * web.densityKgM3 * web.widthM;
  n[now.CORE_SQUARE] = coreSquare;
  n[now.PER_LENGTH] = web.thicknessM / PI;
  n[now.INERTIA_AT_ZERO] = roll.coreInertiaKgM2 - perFourth * (coreSquare * coreSquare);
  n[now.INERTIA_PER_FOURTH] = perFourth;
  n[now.WOUND_N] = roll.woundTensionN;
  n[now.COULOMB] = roll.coulombNm ?? 0;
  n[now.VISCOUS] = roll.viscousNmS ?? 0;
}

/** Relaxed length [m] on a roll of this mean radius [m]. */
export function woundLength(n: Float64Array, radiusM: number): number {
  return (radiusM * radiusM - n[now.CORE_SQUARE]!) / n[now.PER_LENGTH]!;
}

/** Square of the mean radius [m²] of a roll that holds this relaxed length [m]; 0 far below an empty one. */
export function radiusSquare(n: Float64Array, lengthM: number): number {
  return Math.max(0, n[now.CORE_SQUARE]! + n[now.PER_LENGTH]! * lengthM);
}

/** Inertia [kg·m²] at a mean radius squared [m²]; never less than the core's. */
export function inertia(n: Float64Array, squareM2: number): number {
  const square = Math.max(squareM2, n[now.CORE_SQUARE]!);
  return n[now.INERTIA_AT_ZERO]! + n[now.INERTIA_PER_FOURTH]! * (square * square);
}

/** What an out-of-round roll adds to the mean radius [m], from the cosine of its angle. */
export function outOfRound(eccentricityM: number, ovalM: number, cosine: number): number {
  return eccentricityM * cosine + ovalM * (2 * cosine * cosine - 1);
}
