/**
 * Weights of the best linear unbiased mean of several estimates of one quantity: w = E⁻¹1/(1ᵀE⁻¹1), E their covariance
 * (k, k). Source: A. C. Aitken's generalised least squares (from memory). Estimates whose weight would be negative are
 * left out, so that the mean lies among the estimates. A tiny ridge keeps exact (variance 0) estimates usable.
 */
export function blendWeights(covariance: readonly (readonly number[])[]): number[] {
  const all = covariance.map((_, i) => i);
  let used = all;
  while (used.length > 1) {
    const weights = unboundedWeights(covariance, used);
    const worst = weights.reduce((low, w, i) => (w < (weights[low] ?? 0) ? i : low), 0);
    if ((weights[worst] ?? 0) >= 0) return all.map((i) => weights[used.indexOf(i)] ?? 0);
    used = used.filter((_, i) => i !== worst);
  }
  return all.map((i) => (used.includes(i) ? 1 : 0));
}

function unboundedWeights(covariance: readonly (readonly number[])[], used: readonly number[]): number[] {
  const largest = Math.max(...used.map((i) => covariance[i]?.[i] ?? 0));
  if (!(largest > 0)) return used.map(() => 1 / used.length);
  const matrix = used.map((i) => used.map((j) => (covariance[i]?.[j] ?? 0) / largest + (i === j ? 1e-9 : 0)));
  const solution = solve(
    matrix,
    used.map(() => 1),
  );
  const total = solution.reduce((a, b) => a + b, 0);
  return solution.map((w) => w / total);
}

/** Gaussian elimination with row exchange, for the two to five estimates there can be. */
function solve(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const a = matrix.map((row, i) => [...row, right[i] ?? 0]);
  const n = a.length;
  for (let k = 0; k < n; k += 1) {
    const pivot = a.reduce(
      (best, row, i) => (i >= k && Math.abs(row[k] ?? 0) > Math.abs(a[best]?.[k] ?? 0) ? i : best),
      k,
    );
    [a[k], a[pivot]] = [a[pivot] ?? [], a[k] ?? []];
    for (let i = k + 1; i < n; i += 1) {
      const factor = (a[i]?.[k] ?? 0) / (a[k]?.[k] ?? 1);
      a[i] = (a[i] ?? []).map((value, j) => value - factor * (a[k]?.[j] ?? 0));
    }
  }
  const x = new Array<number>(n).fill(0);
  for (let k = n - 1; k >= 0; k -= 1) {
    const known = x.reduce((sum, value, j) => (j > k ? sum + value * (a[k]?.[j] ?? 0) : sum), 0);
    x[k] = ((a[k]?.[n] ?? 0) - known) / (a[k]?.[k] ?? 1);
  }
  return x;
}
