import {Matrix} from 'ml-matrix';
import {type StateSpace} from './state-space';

/** gain/(lag·s + 1); a lag of 0 passes through. Throws RangeError for a lag [s] below 0. */
export function firstOrderLag(gain: number, lagS: number): StateSpace {
  if (!(lagS >= 0)) throw new RangeError(`A lag of ${lagS} s is none.`);
  if (lagS === 0)
    return {
      a: Matrix.zeros(0, 0),
      b: Matrix.zeros(0, 1),
      c: Matrix.zeros(1, 0),
      d: new Matrix([[gain]]),
    };
  return {
    a: new Matrix([[-1 / lagS]]),
    b: new Matrix([[gain / lagS]]),
    c: new Matrix([[1]]),
    d: new Matrix([[0]]),
  };
}

/** gain/s: slope of the output [1/s] per input. */
export function integrator(gainPerS: number): StateSpace {
  return {
    a: new Matrix([[0]]),
    b: new Matrix([[gainPerS]]),
    c: new Matrix([[1]]),
    d: new Matrix([[0]]),
  };
}
