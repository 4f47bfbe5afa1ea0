/**
 * Householder QR of a column-major matrix A (m, n), m ≥ n, in place, with optional column pivoting
 * (Businger, Golub 1965; Golub, Van Loan, "Matrix Computations", from memory). Afterwards the upper triangle of the
 * pivoted columns holds R, and every column of `rhs` holds Qᵀ times what it held.
 * Returns the order of the columns: R's column j belongs to A's column order[j].
 */
export function factorise(
  a: Float64Array,
  m: number,
  n: number,
  rhs: Float64Array | null,
  pivoting: boolean,
): number[] {
  const order = Array.from({ length: n }, (_, k) => k);
  const steps = Math.min(m, n);
  for (let j = 0; j < steps; j++) {
    if (pivoting) bringLargestForward(a, m, n, j, order);
    reflect(a, m, n, j, rhs);
  }
  return order;
}

/** Exchanges column j with the one of largest remaining norm. */
function bringLargestForward(a: Float64Array, m: number, n: number, j: number, order: number[]): void {
  let best = j;
  let bestNorm = -1;
  for (let k = j; k < n; k++) {
    let norm = 0;
    for (let i = j; i < m; i++) norm += a[k * m + i]! * a[k * m + i]!;
    if (norm > bestNorm * (1 + 1e-12)) {
      bestNorm = norm;
      best = k;
    }
  }
  if (best === j) return;
  const column = a.slice(j * m, j * m + m);
  a.copyWithin(j * m, best * m, best * m + m);
  a.set(column, best * m);
  const index = order[j]!;
  order[j] = order[best]!;
  order[best] = index;
}

/** One reflection that clears column j below its diagonal, applied to the later columns and to rhs. */
function reflect(a: Float64Array, m: number, n: number, j: number, rhs: Float64Array | null): void {
  const start = j * m;
  let largest = 0;
  for (let i = j; i < m; i++) largest = Math.max(largest, Math.abs(a[start + i]!));
  if (!(largest > 0)) return;
  let sum = 0;
  for (let i = j; i < m; i++) sum += (a[start + i]! / largest) ** 2;
  const norm = largest * Math.sqrt(sum);
  const pivot = a[start + j]!;
  const alpha = pivot > 0 ? -norm : norm;
  const head = pivot - alpha; // v = column − alpha e_j; vᵀv = 2·norm·(norm + |pivot|)
  const scale = 1 / (norm * (norm + Math.abs(pivot)));
  a[start + j] = head;
  for (let k = j + 1; k < n; k++) applyReflection(a, start, a, k * m, j, m, scale);
  if (rhs) applyReflection(a, start, rhs, 0, j, m, scale);
  a[start + j] = alpha;
}

function applyReflection(
  v: Float64Array,
  vStart: number,
  target: Float64Array,
  tStart: number,
  j: number,
  m: number,
  scale: number,
): void {
  let dot = 0;
  for (let i = j; i < m; i++) dot += v[vStart + i]! * target[tStart + i]!;
  dot *= scale;
  for (let i = j; i < m; i++) target[tStart + i]! -= dot * v[vStart + i]!;
}

/** Number of leading diagonal entries of R that stand above `tolerance` times the first: the numerical rank. */
export function rankOf(r: Float64Array, m: number, n: number, tolerance: number): number {
  const first = Math.abs(r[0] ?? 0);
  let rank = 0;
  while (rank < Math.min(m, n) && Math.abs(r[rank * m + rank]!) > tolerance * first) rank++;
  return rank;
}

/** Solves R x = b for the leading `size` columns (column-major, column stride m). */
export function backSubstitute(r: Float64Array, m: number, size: number, b: Float64Array, x: Float64Array): void {
  for (let j = size - 1; j >= 0; j--) {
    let sum = b[j]!;
    for (let k = j + 1; k < size; k++) sum -= r[k * m + j]! * x[k]!;
    x[j] = sum / r[j * m + j]!;
  }
}
