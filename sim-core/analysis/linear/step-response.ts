import {Matrix} from 'ml-matrix';
import {sampled} from './sampled';
import {type StateSpace} from './state-space';

/**
 * One output after a unit step of the input at t = 0 from rest, at 0, stepS, 2·stepS …, `count` values: exact at
 * those times, for any step [s] and dead time [s].
 */
export function stepResponse(
  system: StateSpace,
  stepS: number,
  count: number,
  {deadTimeS = 0, output = 0} = {},
): number[] {
  const {a, b, c, d} = sampled(system, stepS, deadTimeS);
  let x = Matrix.zeros(a.rows, 1);
  const row = c.getRow(output);
  const values: number[] = [];
  for (let k = 0; k < count; k++) {
    values.push(row.reduce((sum, each, i) => sum + each * x.get(i, 0), d.get(output, 0)));
    if (a.rows > 0) x = a.mmul(x).add(b);
  }
  return values;
}
