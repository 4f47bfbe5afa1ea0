import { choleskyInPlace } from './cholesky.js';
import { factorise, rankOf } from './householder.js';

/**
 * (JᵀJ)⁻¹ over the chosen columns, by pivoted QR of J with its columns scaled to unit length: the condition number is
 * not squared. J is column-major (n, p); `columns` lists those to use. Columns beyond the numerical rank are named in
 * `undetermined`, get no variance and are left out of the inverse.
 */
export interface InverseNormal {
  readonly inverse: Float64Array; // (p, p) row-major, 0 outside the columns used
  readonly undetermined: number[];
}

export function inverseNormalByQr(j: Float64Array, n: number, p: number, columns: readonly number[]): InverseNormal {
  const q = columns.length;
  const rows = Math.max(n, q);
  const a = new Float64Array(rows * q);
  const lengths = columns.map((k, at) => {
    const length = lengthOf(j, k * n, n);
    for (let i = 0; i < n; i++) a[at * rows + i] = length > 0 ? j[k * n + i]! / length : 0;
    return length;
  });
  const order = factorise(a, rows, q, null, true);
  const rank = rankOf(a, rows, q, 1e-13);
  const rInverse = invertUpper(a, rows, rank);
  const inverse = new Float64Array(p * p);
  for (let s = 0; s < rank; s++) {
    for (let t = 0; t < rank; t++) {
      let sum = 0;
      for (let k = Math.max(s, t); k < rank; k++) sum += rInverse[s * rank + k]! * rInverse[t * rank + k]!;
      const row = columns[order[s]!]!;
      const column = columns[order[t]!]!;
      inverse[row * p + column] = sum / (lengths[order[s]!]! * lengths[order[t]!]!);
    }
  }
  return { inverse, undetermined: order.slice(rank).map((at) => columns[at]!) };
}

function lengthOf(j: Float64Array, start: number, n: number): number {
  let sum = 0;
  for (let i = start; i < start + n; i++) sum += j[i]! * j[i]!;
  return Math.sqrt(sum);
}

/** Inverse of the leading upper triangle (size, size), row-major; r is column-major with stride m. */
function invertUpper(r: Float64Array, m: number, size: number): Float64Array {
  const out = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    out[j * size + j] = 1 / r[j * m + j]!;
    for (let i = j - 1; i >= 0; i--) {
      let sum = 0;
      for (let k = i + 1; k <= j; k++) sum += r[k * m + i]! * out[k * size + j]!;
      out[i * size + j] = -sum / r[i * m + i]!;
    }
  }
  return out;
}

/**
 * H⁻¹ over the chosen rows from the normal matrix itself (lower triangle, row-major): quick, good to about
 * 16 − lg(cond H) digits. Null when H is singular to working precision: then use the Jacobian.
 */
export function inverseNormalByCholesky(h: Float64Array, p: number, columns: readonly number[]): InverseNormal | null {
  const q = columns.length;
  const l = new Float64Array(q * q);
  const scale = new Float64Array(q);
  for (let i = 0; i < q; i++) for (let j = 0; j <= i; j++) l[i * q + j] = h[columns[i]! * p + columns[j]!]!;
  if (!choleskyInPlace(l, q, scale, 1e-12)) return null;
  const lInverse = new Float64Array(q * q); // row-major lower triangle
  for (let j = 0; j < q; j++) {
    lInverse[j * q + j] = 1 / l[j * q + j]!;
    for (let i = j + 1; i < q; i++) {
      let sum = 0;
      for (let k = j; k < i; k++) sum += l[i * q + k]! * lInverse[k * q + j]!;
      lInverse[i * q + j] = -sum / l[i * q + i]!;
    }
  }
  const inverse = new Float64Array(p * p);
  for (let s = 0; s < q; s++) {
    for (let t = 0; t <= s; t++) {
      let sum = 0;
      for (let k = s; k < q; k++) sum += lInverse[k * q + s]! * lInverse[k * q + t]!;
      const value = sum * scale[s]! * scale[t]!;
      inverse[columns[s]! * p + columns[t]!] = value;
      inverse[columns[t]! * p + columns[s]!] = value;
    }
  }
  return { inverse, undetermined: [] };
}
