import {type Drive} from '../plant/drive';
import * as now from '../plant/evaluation';
import {type Plant} from '../plant/plant';
import * as at from '../plant/plant-state';
import {type Grid} from '../plant/stand';
import {type Scenario} from '../scenario/scenario';
import {type Points} from '../signal/points';
import {sineAndCosine} from '../signal/sine';
import {MOST_STEPS, QUIET_RAD, QUIET_SHARE, QuietSteps} from './quiet-steps';

/** Places of what a tick is made of. The caller tells: line's speed in the tick, c0 + c1·s + c2·s² … */
export const C0 = 0;
export const C1 = 1;
export const C2 = 2;
export const LOADING = 3; // of the dancer [N]
/** … and `prepare` works out: */
export const RADIUS = 4; // mean radius at the start of the tick [m] …
export const RADIUS_SLOPE = 5; // … and its slope [m/s]
export const PER_INERTIA = 6; // 1/J [1/(kg·m²)] …
export const PER_INERTIA_SLOPE = 7;
export const FINE = 8; // row of the table of steps
export const FLOOR = 9; // pull of the web on the roll within which nothing bends [N]
export const CEILING = 10;
export const SINE = 11; // of the roll's angle; 0 for a round roll
export const COSINE = 12;
const MADE_OF = 13;

/**
 * The plant over one tick in which nothing bends: four stages of Runge–Kutta as in `plant.ts`, but with the
 * strain as state, radius and inertia as lines over the tick, the turn of an uneven roll by series, and two to five
 * milliseconds a step. What load-cell and dancer stands share; the stages themselves, where a run spends its time,
 * stand in one function each: a question asked in every stage made a tick take twice as long.
 */
export abstract class QuietPlant {
  readonly made = new Float64Array(MADE_OF);
  private readonly angle = this.made.subarray(SINE);
  protected readonly steps: QuietSteps;
  protected readonly now: Float64Array;
  protected readonly curve: Points;
  protected readonly drive: Drive;
  protected readonly sampleS: number;
  private readonly rad: number;

  /** `p` is the plant's part of the run's state. */
  constructor(
    scenario: Scenario,
    grid: Grid,
    plant: Plant,
    protected readonly p: Float64Array,
  ) {
    this.drive = plant.drive;
    this.now = plant.equations.now;
    this.curve = plant.equations.curve;
    this.sampleS = grid.sampleS;
    this.rad = QUIET_RAD[scenario.sensing.kind];
    this.steps = new QuietSteps(scenario, grid, plant.drive.changesAtStep);
  }

  /** Moves the plant through tick `tick`. False when something bends in it: then nothing has been written. */
  abstract through(tick: number): boolean;

  /** Roll, steps and bounds of the coming tick. False when it needs more steps than there are rows. */
  protected prepare(): boolean {
    const {p, now: n, made, sampleS} = this;
    const c1 = made[C1]!;
    const omega = p[at.OMEGA]!;
    const isOut = n[now.OUT_OF_ROUND] === 1;

    // R and 1/J and their slopes, from one root and one division
    const square = n[now.CORE_SQUARE]! + n[now.PER_LENGTH]! * p[at.WOUND]!;
    const radius = Math.sqrt(square);
    const perFourth = n[now.INERTIA_PER_FOURTH]!;
    const inertia = n[now.INERTIA_AT_ZERO]! + perFourth * square * square;
    const inverse = 1 / (2 * radius * inertia);
    const perInertia = 2 * radius * inverse;
    const radiusSlope =
      -n[now.PER_LENGTH]! * omega * radius * n[now.PER_WOUND]! * inertia * inverse;
    made[RADIUS] = radius;
    made[RADIUS_SLOPE] = radiusSlope;
    made[PER_INERTIA] = perInertia;
    made[PER_INERTIA_SLOPE] =
      -4 * perInertia * perInertia * perFourth * square * radius * radiusSlope;

    // how finely: (step × natural frequency)², and shares of what decays, for one step in the tick
    const perSpan = n[now.STIFFNESS]! * n[now.PER_SPAN]! * sampleS;
    const yields = square * perInertia + 4 * n[now.PER_MASS]!; // [1/kg]
    const swing = (perSpan * sampleS * yields) / (this.rad * this.rad);
    const loss = perSpan * n[now.LOSS_S]! * yields + n[now.DAMPING]! * n[now.PER_MASS]! * sampleS;
    const torque = n[now.RESIDUAL]! + n[now.TORQUE_SPAN]!;
    const fall = torque * n[now.EXTRA_GRIP]! * n[now.PER_GRIP_SPEED]! * perInertia * sampleS;
    const turn = isOut ? 2 * omega * sampleS : 0;
    let fine = this.steps.fewest;
    while (
      fine * fine < swing ||
      fine * QUIET_SHARE < loss ||
      fine * QUIET_SHARE < fall ||
      fine * this.rad < turn
    )
      fine++;
    made[FINE] = fine;

    const idlerA = n[now.IDLER_N]! + n[now.IDLER_KG]! * c1;
    const idlerB = idlerA + n[now.IDLER_KG]! * 2 * sampleS * made[C2]!;
    made[FLOOR] = Math.max(0, -idlerA, -idlerB);
    made[CEILING] = n[now.BREAK_N]! - Math.max(idlerA, idlerB);

    made[SINE] = 0;
    made[COSINE] = 0;
    if (isOut) sineAndCosine(p[at.THETA]!, this.angle);
    return fine <= MOST_STEPS;
  }
}
