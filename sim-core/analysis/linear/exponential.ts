import {Matrix, solve} from 'ml-matrix';

/** Degree of the Padé approximant: at norm 1/2 its error is below 1e-20 of the result. */
const DEGREE = 8;

/**
 * e^A of a square matrix: scaling, diagonal Padé approximant, squaring (Golub and Van Loan, Matrix Computations,
 * section 9.3; from memory). Throws RangeError for a matrix that is not square or not finite.
 */
export function exponential(a: Matrix): Matrix {
  const size = a.rows;
  if (a.columns !== size) throw new RangeError('Only a square matrix has an exponential.');
  if (size === 0) return Matrix.zeros(0, 0);
  const norm = rowSumNorm(a);
  if (!Number.isFinite(norm)) throw new RangeError('The matrix has an entry that is not finite.');
  const squarings = Math.max(0, Math.ceil(Math.log2(2 * norm)));
  const scaled = Matrix.mul(a, 2 ** -squarings);

  const numerator = Matrix.eye(size);
  const denominator = Matrix.eye(size);
  let power = Matrix.eye(size);
  let weight = 1;
  for (let k = 1; k <= DEGREE; k++) {
    weight *= (DEGREE - k + 1) / (k * (2 * DEGREE - k + 1));
    power = scaled.mmul(power);
    numerator.add(Matrix.mul(power, weight));
    denominator.add(Matrix.mul(power, k % 2 === 0 ? weight : -weight));
  }

  let result = solve(denominator, numerator);
  for (let i = 0; i < squarings; i++) result = result.mmul(result);
  return result;
}

function rowSumNorm(a: Matrix): number {
  return Math.max(...a.to2DArray().map((row) => row.reduce((sum, x) => sum + Math.abs(x), 0)));
}
