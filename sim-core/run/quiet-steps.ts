import {lagsOf} from '../plant/brake';
import {type Grid} from '../plant/stand';
import {ceiling} from '../plant/stiffness';
import {type Scenario} from '../scenario/scenario';
import {decay} from '../signal/decay';

/** Greatest turn in a step of whatever vibrates or turns [rad]; a dancer's quick vibration dies out sooner. */
export const QUIET_RAD = {loadCell: 0.14, dancer: 0.25};

/** A step is this share of a lag, or of the time in which something decays, at most. */
export const QUIET_SHARE = 0.5;

/** Longest step [s]. */
const LONGEST_S = 0.0034;

/** Finest division of a quiet tick. */
export const MOST_STEPS = 32;

/** Places in a row of the table. */
export const STEPS = 0; // steps of this part of the tick
export const STEP_S = 1; // each of this length [s]
export const HALF_DECAY = 2; // of the drive over half a step
export const FULL_DECAY = 3;
export const FILTER_1 = 4; // weights of the sensor's signal at the four stages …
export const FILTER_2 = 5;
export const FILTER_3 = 6;
export const FILTER_4 = 7;
export const FILTER_KEEPS = 8; // … and what the filter keeps of itself
export const HEAT_S = 9; // the step, less what cooling takes back within it [s]
export const ROW = 10;

/** Where the rows of the late part begin; those of the early part begin at 0. Row n: a tick of about n steps. */
export const LATE = (MOST_STEPS + 1) * ROW;

/** Constants of the steps that a quiet tick of a stand may be divided into. */
export class QuietSteps {
  readonly table = new Float64Array(2 * LATE);
  /** Where the late part begins [s into the tick]; 0: there is no early part. */
  readonly changesAtS: number;
  /** Coarsest division of a tick, whatever the plant does. */
  readonly fewest: number;

  /** `changesAtStep`: plant step of a tick at which the drive's delayed command changes. */
  constructor(
    private readonly scenario: Scenario,
    grid: Grid,
    changesAtStep: number,
  ) {
    const {sampleS} = grid;
    const [lagS] = lagsOf(scenario.brake);
    this.changesAtS = changesAtStep * grid.plantStepS;
    const shortest = [lagS, this.filterS()].filter((timeS) => timeS > 0);
    const longestS = Math.min(LONGEST_S, ...shortest.map((timeS) => QUIET_SHARE * timeS));
    this.fewest = Math.max(1, ceiling(sampleS / longestS));
    for (let steps = 1; steps <= MOST_STEPS; steps++) {
      const stepS = sampleS / steps;
      if (this.changesAtS > 0) this.fill(steps * ROW, this.changesAtS, stepS, lagS);
      this.fill(LATE + steps * ROW, sampleS - this.changesAtS, stepS, lagS);
    }
  }

  private filterS(): number {
    const {sensing} = this.scenario;
    return sensing.kind === 'loadCell' ? sensing.filterS : 0;
  }

  /** One row: a part of a tick in equal steps of at most `longestS` [s]. */
  private fill(row: number, partS: number, longestS: number, lagS: number): void {
    const {table} = this;
    const {capacityJPerK, conductanceWPerK} = this.scenario.brake;
    const steps = ceiling(partS / longestS);
    const stepS = partS / steps;
    table[row + STEPS] = steps;
    table[row + STEP_S] = stepS;
    if (lagS > 0) {
      const half = decay(stepS / (2 * lagS));
      table[row + HALF_DECAY] = half;
      table[row + FULL_DECAY] = half * half;
    }
    table[row + HEAT_S] = stepS * (1 - (stepS * conductanceWPerK) / (2 * capacityJPerK));
    if (this.filterS() > 0) this.fillFilter(row, stepS / this.filterS());
  }

  /** Runge–Kutta of the fourth order for dm/dt = (s − m)/filter, multiplied out; `a` = step/filter. */
  private fillFilter(row: number, a: number): void {
    const {table} = this;
    const square = a * a;
    const first = (a - square + (square * a) / 2 - (square * square) / 4) / 6;
    const second = (2 * a - square + (square * a) / 2) / 6;
    const third = (2 * a - square) / 6;
    const fourth = a / 6;
    table[row + FILTER_1] = first;
    table[row + FILTER_2] = second;
    table[row + FILTER_3] = third;
    table[row + FILTER_4] = fourth;
    table[row + FILTER_KEEPS] = 1 - (first + second + third + fourth);
  }
}
