/**
 * Cholesky factor of the leading (n, n) block of `a` (row-major, stride n, lower triangle), in place: A = L Lᵀ.
 * Works on the equilibrated matrix A_ij/√(A_ii A_jj), so that parameters of very different size do no harm.
 * Returns false where a pivot falls to `tolerance` (relative) or is not finite: A is singular to working precision.
 * `scale` (n) receives 1/√A_ii. Source: Golub, Van Loan, "Matrix Computations" (from memory).
 */
export function choleskyInPlace(a: Float64Array, n: number, scale: Float64Array, tolerance: number): boolean {
  for (let i = 0; i < n; i++) {
    const diagonal = a[i * n + i]!;
    if (!(diagonal > 0) || diagonal === Number.POSITIVE_INFINITY) return false;
    scale[i] = 1 / Math.sqrt(diagonal);
  }
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = a[i * n + j]! * scale[i]! * scale[j]!;
      for (let k = 0; k < j; k++) sum -= a[i * n + k]! * a[j * n + k]!;
      if (i === j) {
        if (!(sum > tolerance)) return false;
        a[i * n + i] = Math.sqrt(sum);
      } else a[i * n + j] = sum / a[j * n + j]!;
    }
  }
  return true;
}

/** Solves A x = b with the factor and scale of `choleskyInPlace`; x may be b. */
export function choleskySolve(
  l: Float64Array,
  n: number,
  scale: Float64Array,
  b: Float64Array,
  x: Float64Array,
): Float64Array {
  for (let i = 0; i < n; i++) {
    let sum = b[i]! * scale[i]!;
    for (let k = 0; k < i; k++) sum -= l[i * n + k]! * x[k]!;
    x[i] = sum / l[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = x[i]!;
    for (let k = i + 1; k < n; k++) sum -= l[k * n + i]! * x[k]!;
    x[i] = sum / l[i * n + i]!;
  }
  for (let i = 0; i < n; i++) x[i]! *= scale[i]!;
  return x;
}
