import * as now from '../plant/evaluation';
import {Plant} from '../plant/plant';
import * as place from '../plant/plant-state';
import {inertia, radiusSquare} from '../plant/roll';
import {type Scenario} from '../scenario/scenario';

/** Where a plant is put: running steadily with this tension and line speed. */
export interface SteadyPoint {
  readonly tensionN: number;
  readonly lineMps: number;
}

/** The engine's plant by itself, in a state that a spec sets. */
export interface APlant {
  readonly plant: Plant;
  /** The integrated states, places as in plant-state.ts. */
  readonly y: Float64Array;
  /** Brake torque that holds the point [N·m]. */
  readonly torqueNm: number;
  readonly inertiaKgM2: number;
  /** Slopes at a state and brake torque, and the tension there [N]. */
  readonly slopes: (
    y: Float64Array,
    torqueNm: number,
  ) => {readonly slope: Float64Array; readonly tensionN: number};
}

/** The plant of a document with a straight brake curve, running steadily: dℓ/dt = 0 and dω/dt = 0. */
export function aPlant(scenario: Scenario, {tensionN, lineMps}: SteadyPoint): APlant {
  const sampleS = scenario.controller.sampleS ?? 0.01;
  const plantStepS = scenario.plantStepS ?? 0.001;
  const grid = {sampleS, plantStepS, stepsPerTick: Math.round(sampleS / plantStepS)};
  const state = new Float64Array(Plant.size(scenario, grid));
  const plant = new Plant(scenario, state, grid);
  plant.reset(scenario.controller.standstillPct);
  const {equations, stand, line} = plant;
  const {now: n} = equations;
  const y = state.subarray(0, place.INTEGRATED);

  line.command(0, {command: 'run', speedMps: lineMps, rampS: 0});
  const radiusM = stand.radius();
  const strain = tensionN / n[now.STIFFNESS]!;
  y[place.LENGTH] = scenario.span.lengthM / (1 + strain);
  y[place.OMEGA] = lineMps / ((1 + strain) * n[now.PER_WOUND]! * radiusM);
  plant.openTick(0);
  const torqueNm =
    tensionN * radiusM - n[now.VISCOUS]! * y[place.OMEGA] - n[now.COULOMB]! * Math.sign(lineMps);

  const slopes = (
    at: Float64Array,
    brakeNm: number,
  ): {readonly slope: Float64Array; readonly tensionN: number} => {
    n[now.CLOCK] = 0;
    n[now.DRIVE_PCT] = (100 * (brakeNm - n[now.RESIDUAL]!)) / n[now.TORQUE_SPAN]!;
    const slope = new Float64Array(place.INTEGRATED);
    equations.settle(at, slope);
    return {slope, tensionN: n[now.TENSION_NOW]!};
  };
  return {
    plant,
    y,
    torqueNm,
    inertiaKgM2: inertia(n, radiusSquare(n, y[place.WOUND]!)),
    slopes,
  };
}

/** dx/dt = A·x + B·M, T = C·x + D·M in deviations from a steady point; M is the brake's torque. */
export interface Linearised {
  readonly a: number[][];
  readonly b: number[][];
  readonly c: number[][];
  readonly d: number[][];
}

/** Roll speed, web on the roll, web in the span: all that tension depends on with a load cell. */
const STATES = [place.OMEGA, place.WOUND, place.LENGTH];
/** Share of a state that it is moved to either side; of the web on a nearly empty roll 1 mm. */
const SHARE = 1e-7;
const LEAST_M = 1e-3;

/** Differentiates the engine's own equations by central differences. */
export function linearised({y, torqueNm, slopes}: APlant): Linearised {
  const differences = (move: (sign: number) => ReturnType<APlant['slopes']>, step: number) => {
    const up = move(1);
    const down = move(-1);
    return {
      slopes: STATES.map((state) => (up.slope[state]! - down.slope[state]!) / (2 * step)),
      tension: (up.tensionN - down.tensionN) / (2 * step),
    };
  };
  const columns = STATES.map((state) => {
    const step =
      state === place.WOUND ? Math.max(LEAST_M, 1e-5 * y[state]!) : SHARE * Math.abs(y[state]!);
    return differences((sign) => {
      const moved = y.slice();
      moved[state]! += sign * step;
      return slopes(moved, torqueNm);
    }, step);
  });
  const stepNm = 1e-3 * torqueNm;
  const input = differences((sign) => slopes(y.slice(), torqueNm + sign * stepNm), stepNm);
  return {
    a: STATES.map((_, row) => columns.map((column) => column.slopes[row]!)),
    b: input.slopes.map((value) => [value]),
    c: [columns.map(({tension}) => tension)],
    d: [[input.tension]],
  };
}
