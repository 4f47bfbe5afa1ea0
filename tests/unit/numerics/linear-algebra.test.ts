import { inverse, Matrix, solve } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { choleskyInPlace, choleskySolve } from '../../../calculators/numerics/cholesky.js';
import { inverseNormalByCholesky, inverseNormalByQr } from '../../../calculators/numerics/covariance.js';
import { backSubstitute, factorise, rankOf } from '../../../calculators/numerics/householder.js';
import { seededRandom } from '../../../calculators/numerics/random.js';

const [m, n] = [12, 5];
const random = seededRandom(3);
const rows = Array.from({ length: m }, () => Array.from({ length: n }, (_, k) => 10 ** (2 * k - 4) * random.normal()));
const columnMajor = Float64Array.from({ length: m * n }, (_, at) => rows[at % m]![Math.trunc(at / m)]!);
const A = new Matrix(rows);
const normal = A.transpose().mmul(A);
const lower = Float64Array.from({ length: n * n }, (_, at) => normal.get(Math.trunc(at / n), at % n));

describe('QR by Householder reflections', () => {
  it('solves the least-squares problem as another library does, pivoted or not', () => {
    const b = Array.from({ length: m }, () => random.normal());
    const expected = solve(A, Matrix.columnVector(b), true).to1DArray();
    for (const pivoting of [false, true]) {
      const a = columnMajor.slice();
      const rhs = Float64Array.from(b);
      const order = factorise(a, m, n, rhs, pivoting);
      const x = new Float64Array(n);
      backSubstitute(a, m, n, rhs, x);
      for (const [j, k] of order.entries()) expect(x[j]! / expected[k]!).toBeCloseTo(1, 9);
    }
  });

  it('tells the rank of columns that depend on each other', () => {
    const a = columnMajor.slice();
    for (let i = 0; i < m; i++) a[4 * m + i] = 2 * a[i]! - a[m + i]!;
    factorise(a, m, n, null, true);
    expect(rankOf(a, m, n, 1e-13)).toBe(4);
  });
});

describe('inverse of the normal matrix', () => {
  const expected = inverse(normal);
  const relativeTo = (found: Float64Array, i: number, j: number) =>
    Math.abs(found[i * n + j]! - expected.get(i, j)) / Math.sqrt(expected.get(i, i) * expected.get(j, j));

  it('is the same by QR, by Cholesky and by another library', () => {
    const byQr = inverseNormalByQr(columnMajor, m, n, [0, 1, 2, 3, 4]).inverse;
    const byCholesky = inverseNormalByCholesky(lower, n, [0, 1, 2, 3, 4])!.inverse;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        expect(relativeTo(byQr, i, j)).toBeLessThan(1e-6);
        expect(relativeTo(byCholesky, i, j)).toBeLessThan(1e-6);
      }
    }
  });

  it('leaves out columns that are not asked for', () => {
    const { inverse: found } = inverseNormalByQr(columnMajor, m, n, [0, 3]);
    expect(found[1 * n + 1]).toBe(0);
    const pair = inverse(
      new Matrix([
        [normal.get(0, 0), normal.get(0, 3)],
        [normal.get(3, 0), normal.get(3, 3)],
      ]),
    );
    expect(found[3 * n + 3]! / pair.get(1, 1)).toBeCloseTo(1, 9);
  });

  it('is refused by Cholesky where the matrix is singular', () => {
    const singular = Float64Array.from([1, 1, 1, 1]);
    expect(inverseNormalByCholesky(singular, 2, [0, 1])).toBeNull();
  });
});

it('solves a positive definite system by Cholesky, whatever the units of its rows', () => {
  const l = lower.slice();
  const scale = new Float64Array(n);
  expect(choleskyInPlace(l, n, scale, 1e-15)).toBe(true);
  const truth = [1, -2, 3, -4, 5];
  const b = Float64Array.from(normal.mmul(Matrix.columnVector(truth)).to1DArray());
  const x = choleskySolve(l, n, scale, b, new Float64Array(n));
  for (const [k, value] of truth.entries()) expect(x[k]! / value).toBeCloseTo(1, 6);
});
