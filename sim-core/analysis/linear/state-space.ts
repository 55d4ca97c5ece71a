import {Matrix, solve} from 'ml-matrix';
import {complex, type Complex} from './complex';

/**
 * A linear system dx/dt = A·x + B·u, y = C·x + D·u with n states, one input and m outputs. Units are those of
 * what it describes; dead time is kept beside it, see `sampled`.
 */
export interface StateSpace {
  /** n × n [1/s]. */
  readonly a: Matrix;
  /** n × 1. */
  readonly b: Matrix;
  /** m × n. */
  readonly c: Matrix;
  /** m × 1. */
  readonly d: Matrix;
}

/** `second` after `first`: the first output of `first` is the input of `second`. */
export function series(first: StateSpace, second: StateSpace): StateSpace {
  const n = first.a.rows;
  const m = second.a.rows;
  const a = Matrix.zeros(n + m, n + m);
  const b = Matrix.zeros(n + m, 1);
  const c = Matrix.zeros(second.c.rows, n + m);
  const d1 = first.d.get(0, 0);
  put(a, first.a, 0, 0);
  put(a, second.a, n, n);
  put(b, first.b, 0, 0);
  put(b, Matrix.mul(second.b, d1), n, 0);
  put(c, second.c, 0, n);
  if (n > 0) {
    const c1 = first.c.subMatrixRow([0]);
    put(a, second.b.mmul(c1), n, 0);
    put(c, second.d.mmul(c1), 0, 0);
  }
  return {a, b, c, d: Matrix.mul(second.d, d1)};
}

/** The same system with the outputs of `first` of the series below its own: what goes in and what comes out. */
export function seriesWithBoth(first: StateSpace, second: StateSpace): StateSpace {
  const {a, b, c, d} = series(first, second);
  const inner = Matrix.zeros(first.c.rows, a.rows);
  put(inner, first.c, 0, 0);
  return {a, b, c: stack(c, inner), d: stack(d, first.d)};
}

/** C·(jω − A)⁻¹·B + D of one output at `radps` [rad/s]. Throws RangeError on a pole of the system. */
export function frequencyResponse(system: StateSpace, radps: number, output = 0): Complex {
  const {a, b, c, d} = system;
  const n = a.rows;
  if (n === 0) return complex(d.get(output, 0));
  // (jω − A)·(p + j·q) = B in real numbers: −A·p − ω·q = B, ω·p − A·q = 0
  const whole = Matrix.zeros(2 * n, 2 * n);
  put(whole, Matrix.mul(a, -1), 0, 0);
  put(whole, Matrix.mul(a, -1), n, n);
  for (let i = 0; i < n; i++) {
    whole.set(i, n + i, -radps);
    whole.set(n + i, i, radps);
  }
  const right = Matrix.zeros(2 * n, 1);
  put(right, b, 0, 0);
  const x = solve(whole, right).to1DArray();
  if (!x.every(Number.isFinite)) throw new RangeError(`There is a pole at ${radps} rad/s.`);
  const row = c.getRow(output);
  const dot = (from: number): number => row.reduce((sum, each, i) => sum + each * x[from + i]!, 0);
  return complex(dot(0) + d.get(output, 0), dot(n));
}

/** Writes `part` into `whole`, its first entry at this row and column. */
export function put(whole: Matrix, part: Matrix, row: number, column: number): void {
  if (part.rows > 0 && part.columns > 0) whole.setSubMatrix(part, row, column);
}

function stack(upper: Matrix, lower: Matrix): Matrix {
  const whole = Matrix.zeros(upper.rows + lower.rows, upper.columns);
  put(whole, upper, 0, 0);
  put(whole, lower, upper.rows, 0);
  return whole;
}
