import {Matrix} from 'ml-matrix';
import {exponential} from './exponential';
import {put, type StateSpace} from './state-space';

/** x[k+1] = A·x[k] + B·u[k], y[k] = C·x[k] + D·u[k], one step every `sampleS` [s]; shapes as in StateSpace. */
export interface SampledSystem {
  readonly sampleS: number;
  readonly a: Matrix;
  readonly b: Matrix;
  readonly c: Matrix;
  readonly d: Matrix;
}

/** A delay within this of a whole sample is that sample [s]. */
const SAME_S = 1e-12;

/**
 * The system as a computer meets it that holds its output between samples and waits for a dead time: exact at
 * the samples, for any dead time. (Zero-order hold: Åström and Wittenmark, Computer-Controlled Systems, sections
 * 2.3 and 2.4; from memory.) The states that are added hold the inputs on their way, the newest first.
 * Throws RangeError for a sample period not above 0 or a dead time below 0.
 */
export function sampled(system: StateSpace, sampleS: number, deadTimeS = 0): SampledSystem {
  if (!(sampleS > 0) || !(deadTimeS >= 0))
    throw new RangeError(`A period of ${sampleS} s with a dead time of ${deadTimeS} s.`);
  let whole = Math.floor(deadTimeS / sampleS);
  let rest = deadTimeS - whole * sampleS; // the part of a sample the old input goes on for
  if (rest > sampleS - SAME_S) {
    whole++;
    rest = 0;
  } else if (rest < SAME_S) rest = 0;
  const late = held(system, sampleS - rest); // newer input, until the end of the sample
  const early = held(system, rest);

  const n = system.a.rows;
  const waiting = rest > 0 ? whole + 1 : whole;
  const a = Matrix.zeros(n + waiting, n + waiting);
  const b = Matrix.zeros(n + waiting, 1);
  const c = Matrix.zeros(system.c.rows, n + waiting);
  const d = Matrix.zeros(system.c.rows, 1);
  put(a, late.a.mmul(early.a), 0, 0);
  put(c, system.c, 0, 0);
  for (let i = 1; i < waiting; i++) a.set(n + i, n + i - 1, 1);
  if (waiting > 0) b.set(n, 0, 1);
  // the input of `age` samples ago: this sample's own, or one on its way
  const enter = (age: number, part: Matrix): void => {
    if (age === 0) put(b, part, 0, 0);
    else put(a, part, 0, n + age - 1);
  };
  enter(whole, late.b);
  if (rest > 0) enter(whole + 1, late.a.mmul(early.b));
  // at the sample itself the older of the two inputs is in force
  if (waiting === 0) put(d, system.d, 0, 0);
  else put(c, system.d, 0, n + waiting - 1);
  return {sampleS, a, b, c, d};
}

/** e^(A·t) and what a constant input adds over the time t [s]. */
function held({a, b}: StateSpace, timeS: number): {readonly a: Matrix; readonly b: Matrix} {
  const n = a.rows;
  const whole = Matrix.zeros(n + 1, n + 1);
  put(whole, Matrix.mul(a, timeS), 0, 0);
  put(whole, Matrix.mul(b, timeS), 0, n);
  const power = exponential(whole);
  if (n === 0) return {a: Matrix.zeros(0, 0), b: Matrix.zeros(0, 1)};
  return {
    a: power.subMatrix(0, n - 1, 0, n - 1),
    b: power.subMatrix(0, n - 1, n, n),
  };
}
