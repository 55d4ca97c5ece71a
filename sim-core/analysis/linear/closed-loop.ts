import {EigenvalueDecomposition, Matrix} from 'ml-matrix';
import {type SampledSystem} from './sampled';

/** The engine's sampled PID in its linear range. Gain in output per measurement; times in s. */
export interface LoopController {
  readonly gain: number;
  /** Integral time [s]; 0 for none. */
  readonly integralS: number;
  /** Derivative time [s]; 0 for none. */
  readonly derivativeS?: number;
  /** Derivative filter: Tf = Td/N. */
  readonly filterFactor?: number;
  /** Weight of the set point in the proportional part. */
  readonly setPointWeight?: number;
}

/** What comes from outside at a sample k, as deviations. */
export interface LoopInputs {
  readonly setPoint?: (k: number) => number;
  /** Added to the controller's output on its way to the process. */
  readonly load?: (k: number) => number;
}

/** What the loop did, sample by sample, as deviations from where it stood. */
export interface LoopResponse {
  /** Controller output of that sample. */
  readonly output: readonly number[];
  /** Every output of the process; the controller sees the first. */
  readonly process: readonly (readonly number[])[];
}

/** Places behind the states of the process. */
const INTEGRAL = 0;
const DERIVATIVE = 1;
const LAST = 2;
const OWN = 3;

/**
 * The loop of a sampled process and a sampled PID, from rest, `count` samples: exact for a linear plant with held
 * output. In each sample the controller measures, then sets its output. Throws RangeError for a process whose
 * first output follows the input at once: measured before it is set, it can't.
 */
export function loopResponse(
  process: SampledSystem,
  controller: LoopController,
  inputs: LoopInputs,
  count: number,
): LoopResponse {
  refuseFeedThrough(process);
  let state = Matrix.zeros(process.a.rows + OWN, 1);
  const output: number[] = [];
  const outputs = Array.from({length: process.c.rows}, (): number[] => []);
  for (let k = 0; k < count; k++) {
    const moved = move(process, controller, state, {
      setPoint: inputs.setPoint?.(k) ?? 0,
      load: inputs.load?.(k) ?? 0,
    });
    output.push(moved.output);
    outputs.forEach((each, i) => each.push(moved.process[i]!));
    state = moved.state;
  }
  return {output, process: outputs};
}

/** Poles of the closed loop in the plane of z, as [real, imaginary]; the loop is stable when all lie within 1. */
export function closedLoopPoles(
  process: SampledSystem,
  controller: LoopController,
): readonly (readonly [number, number])[] {
  refuseFeedThrough(process);
  const size = process.a.rows + OWN;
  const whole = Matrix.zeros(size, size);
  for (let i = 0; i < size; i++) {
    const unit = Matrix.zeros(size, 1);
    unit.set(i, 0, 1);
    const {state} = move(process, controller, unit, {setPoint: 0, load: 0});
    whole.setColumn(i, state.to1DArray());
  }
  const {realEigenvalues, imaginaryEigenvalues} = new EigenvalueDecomposition(whole);
  return realEigenvalues.map((re, i) => [re, imaginaryEigenvalues[i]!]);
}

/** Whether the loop comes to rest by itself. A pole that its controller leaves at 1 (no integral part) does not count. */
export function isStable(process: SampledSystem, controller: LoopController): boolean {
  const sizes = closedLoopPoles(process, controller).map(([re, im]) => Math.hypot(re, im));
  const idle = controller.integralS > 0 ? 0 : 1; // the integral that nothing moves
  return sizes
    .sort((one, other) => other - one)
    .slice(idle)
    .every((size) => size < 1);
}

/** One sample: measure, set the output, move the process. Laws and order of the engine's `pidOutput`. */
function move(
  {a, b, c, d, sampleS}: SampledSystem,
  controller: LoopController,
  state: Matrix,
  {setPoint, load}: {readonly setPoint: number; readonly load: number},
): {readonly state: Matrix; readonly output: number; readonly process: number[]} {
  const {gain, integralS, derivativeS = 0, filterFactor = 10, setPointWeight = 1} = controller;
  const n = a.rows;
  const x = n > 0 ? state.subMatrix(0, n - 1, 0, 0) : Matrix.zeros(0, 1);
  const own = (place: number): number => state.get(n + place, 0);
  const seen = c.getRow(0).reduce((sum, each, i) => sum + each * x.get(i, 0), 0);

  const filterS = derivativeS / filterFactor;
  const derivative =
    derivativeS > 0 ? (filterS * own(DERIVATIVE) + seen - own(LAST)) / (filterS + sampleS) : 0;
  const proportional = gain * (setPointWeight * setPoint - seen);
  const output = proportional + own(INTEGRAL) - gain * derivativeS * derivative;
  const enters = output + load;

  const next = Matrix.zeros(n + OWN, 1);
  if (n > 0) next.setSubMatrix(a.mmul(x).add(Matrix.mul(b, enters)), 0, 0);
  const step = integralS > 0 ? ((gain * sampleS) / integralS) * (setPoint - seen) : 0;
  next.set(n + INTEGRAL, 0, own(INTEGRAL) + step);
  next.set(n + DERIVATIVE, 0, derivative);
  next.set(n + LAST, 0, seen);
  const process = c
    .mmul(x)
    .to1DArray()
    .map((value, i) => value + d.get(i, 0) * enters);
  return {state: next, output, process};
}

function refuseFeedThrough({d}: SampledSystem): void {
  if (d.get(0, 0) !== 0)
    throw new RangeError('The process answers within the sample that it is set in.');
}
