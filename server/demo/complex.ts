/** Complex numbers of the demo's small circuits: a few thousand values, so plain objects serve. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}
export const real = (re: number): Complex => ({ re, im: 0 });
export const add = (...terms: Complex[]): Complex => ({
  re: terms.reduce((sum, term) => sum + term.re, 0),
  im: terms.reduce((sum, term) => sum + term.im, 0),
});
export const multiply = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});
export const inverse = (a: Complex): Complex => {
  const square = a.re * a.re + a.im * a.im;
  return { re: a.re / square, im: -a.im / square };
};
/** Branches side by side: the inverse of the sum of their inverses. */
export const parallel = (...branches: Complex[]): Complex => inverse(add(...branches.map(inverse)));
