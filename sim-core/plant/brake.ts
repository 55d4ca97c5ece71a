import {type BrakeParams} from '../scenario/scenario';
import {Points} from '../signal/points';

/** Least share of its cold torque that a hot brake keeps. */
export const LEAST_FADE = 0.3;

const STRAIGHT = [
  [0, 0],
  [100, 1],
] as const;

/** A brake's fixed properties with every default filled in. */
export interface Brake {
  readonly curve: Points;
  /** Torque at zero drive [N·m]. */
  readonly residualNm: number;
  /** Torque that the curve adds at most [N·m]. */
  readonly spanNm: number;
  readonly lagS: number;
  readonly playPct: number;
  readonly stickPct: number;
  /** Breakaway − 1. */
  readonly extraGrip: number;
  /** [s/rad] */
  readonly perGripSpeed: number;
  readonly fadePerK: number;
  readonly fadeStartC: number;
  /** [K/J] */
  readonly perCapacity: number;
  readonly conductanceWPerK: number;
  readonly ambientC: number;
  readonly limitC: number;
}

export function brakeOf(params: BrakeParams): Brake {
  const residualNm = params.residualTorqueNm ?? 0;
  return {
    curve: new Points(params.curve ?? STRAIGHT),
    residualNm,
    spanNm: params.maxTorqueNm - residualNm,
    lagS: params.lagS,
    playPct: params.playPct ?? 0,
    stickPct: params.stickPct ?? 0,
    extraGrip: (params.breakaway ?? 1) - 1,
    perGripSpeed: 1 / (params.breakawayRadps ?? 0.5),
    fadePerK: params.fadePerK ?? 0,
    fadeStartC: params.fadeStartC ?? 80,
    perCapacity: 1 / params.capacityJPerK,
    conductanceWPerK: params.conductanceWPerK,
    ambientC: params.ambientC ?? 25,
    limitC: params.limitC ?? 150,
  };
}

/** Share of its torque that a brake at `brakeC` [°C] keeps. */
export function fade(brake: Brake, brakeC: number): number {
  return Math.max(LEAST_FADE, 1 - brake.fadePerK * Math.max(0, brakeC - brake.fadeStartC));
}

/** How much harder the brake grips at `omega` [rad/s] than at speed. */
export function grip(brake: Brake, omega: number): number {
  const z = omega * brake.perGripSpeed;
  return 1 + brake.extraGrip / (1 + z * z);
}

/** Torque [N·m] of a sliding brake at full speed, before the grip at crawl. */
export function slidingTorque(brake: Brake, drivePct: number, brakeC: number): number {
  return (brake.residualNm + brake.spanNm * brake.curve.at(drivePct)) * fade(brake, brakeC);
}
