import {type BrakeParams} from '../scenario/scenario';
import * as now from './evaluation';

/** Least share of its cold torque that a hot brake keeps. */
export const LEAST_FADE = 0.3;

/** Torque over drive when the document gives no curve. */
export const STRAIGHT = [
  [0, 0],
  [100, 1],
] as const;

/** Fills in what of the brake never changes. */
export function fixBrake(n: Float64Array, brake: BrakeParams): void {
  const residualNm = brake.residualTorqueNm ?? 0;
  n[now.RESIDUAL] = residualNm;
  n[now.TORQUE_SPAN] = brake.maxTorqueNm - residualNm;
  n[now.EXTRA_GRIP] = (brake.breakaway ?? 1) - 1;
  n[now.PER_GRIP_SPEED] = 1 / (brake.breakawayRadps ?? 0.5);
  n[now.FADE_PER_K] = brake.fadePerK ?? 0;
  n[now.FADE_START] = brake.fadeStartC ?? 80;
  n[now.PER_CAPACITY] = 1 / brake.capacityJPerK;
  n[now.CONDUCTANCE] = brake.conductanceWPerK;
  n[now.AMBIENT] = brake.ambientC ?? 25;
}

/** Lags of the drive while it rises and while it falls [s]. */
export function lagsOf({lagS, lagUpS, lagDownS}: BrakeParams): readonly [number, number] {
  return [lagUpS ?? lagS, lagDownS ?? lagS];
}

/** Share of its torque that a brake at this temperature [°C] keeps. */
export function fade(n: Float64Array, brakeC: number): number {
  const above = brakeC - n[now.FADE_START]!;
  if (!(above > 0)) return 1;
  return Math.max(LEAST_FADE, 1 - n[now.FADE_PER_K]! * above);
}

/** How much harder the brake grips at `omega` [rad/s] than at speed. */
export function grip(n: Float64Array, omega: number): number {
  const z = omega * n[now.PER_GRIP_SPEED]!;
  return 1 + n[now.EXTRA_GRIP]! / (1 + z * z);
}
