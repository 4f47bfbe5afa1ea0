import { type ComplexArray, complexArray } from '../numerics/complex-array.js';
import type { FitParameter } from '../numerics/least-squares-problem.js';
import type { FrequencyGrid } from './frequency-grid.js';
import { type SuspensionModel, suspensionParameters } from './suspension.js';
import { type CoilModel, coilImpedance, coilParameters } from './voice-coil.js';

/** What hangs on the cone in one sweep, beside the driver itself. */
export interface DriverLoad {
  readonly mass: boolean; // added mass, as mu = m/Mms
  readonly box: 'none' | 'sealed' | 'leaky' | 'leaky-absorbing'; // closed box: alpha, then QL, then QA
}
export const FREE_AIR: DriverLoad = { mass: false, box: 'none' };

export interface DriverModel {
  readonly coil: CoilModel;
  readonly suspension: SuspensionModel;
  readonly load: DriverLoad;
}

const logged = (id: string, lower: number, upper: number): FitParameter => ({ id, logScaled: true, lower, upper });
const CORE = [logged('Re', 1e-2, 1e4), logged('fs', 0.5, 5e4), logged('Qms', 1e-2, 1e3), logged('Qes', 1e-3, 1e3)];
const MU: FitParameter = { id: 'mu', lower: -0.9, upper: 100, maxStep: 0.5, typical: 0.1 };
const BOX = [logged('alpha', 1e-3, 1e3), logged('QL', 0.3, 3000), logged('QA', 0.5, 3000)];
const BOX_COUNT: Readonly<Record<DriverLoad['box'], number>> = { none: 0, sealed: 1, leaky: 2, 'leaky-absorbing': 3 };

/** Order of the parameters: Re fs Qms Qes, the coil's, the suspension's, then mu, alpha, QL, QA as the load has them. */
export function driverParameters({ coil, suspension, load }: DriverModel): FitParameter[] {
  return [
    ...CORE,
    ...coilParameters(coil),
    ...suspensionParameters(suspension),
    ...(load.mass ? [MU] : []),
    ...BOX.slice(0, BOX_COUNT[load.box]),
  ];
}

/**
 * Terminal impedance of a driver, in ohm:  Z = Re + Zcoil + (Re/Qes)/y,  x = f/fs,
 * y = jx(1 + mu) + 1/Qms + 1/(jx·c) + alpha·u,   1/u = 1/(1/(jx) + 1/(g·QA)) + g/QL,   g = √(1 + alpha).
 * c: relative compliance of the suspension. Free air has mu = alpha = 0.
 * Source: R. H. Small, "Direct-Radiator Loudspeaker System Analysis", J. Audio Eng. Soc. 20, 1972, and "Closed-Box
 * Loudspeaker Systems", J. Audio Eng. Soc. 20, 1972 (from memory), normalised here.
 * Shapes: z (n); derivatives: one column (n) of ∂ln Z/∂(scaled parameter) for each parameter.
 */
export function driverImpedance(
  model: DriverModel,
  values: ArrayLike<number>,
  grid: FrequencyGrid,
  z: ComplexArray = complexArray(grid.omega.length),
  derivatives?: readonly ComplexArray[],
): ComplexArray {
  const coilCount = coilParameters(model.coil).length;
  coilImpedance(model.coil, values, 4, grid, z, derivatives?.slice(4, 4 + coilCount));
  addMotionalPart(model, values, grid, z, derivatives, 4 + coilCount);
  if (derivatives) divideBy(derivatives, z);
  return z;
}

/** Adds Re + (Re/Qes)/y to z; writes ∂Z/∂(scaled parameter) of Re, fs, Qms, Qes, suspension and load. */
function addMotionalPart(
  { suspension, load }: DriverModel,
  values: ArrayLike<number>,
  { frequencyHz }: FrequencyGrid,
  z: ComplexArray,
  d: readonly ComplexArray[] | undefined,
  at: number, // first parameter of the suspension
): void {
  const [re, fs, qms, qes] = [values[0]!, values[1]!, values[2]!, values[3]!];
  const suspensionCount = suspensionParameters(suspension).length;
  const muAt = at + suspensionCount;
  const boxAt = muAt + (load.mass ? 1 : 0);
  const massFactor = 1 + (load.mass ? values[muAt]! : 0);
  const boxCount = BOX_COUNT[load.box];
  const spring = newSlopes();
  const box = newSlopes();
  for (let i = 0; i < frequencyHz.length; i++) {
    const x = frequencyHz[i]! / fs;
    springTerm(suspension, values, at, x, fs, spring);
    let yRe = 1 / qms + spring.re;
    let yIm = x * massFactor + spring.im;
    if (boxCount > 0) {
      boxTerm(values, boxAt, boxCount, x, box);
      yRe += box.re;
      yIm += box.im;
    }
    const size = re / qes / (yRe * yRe + yIm * yIm);
    const mRe = yRe * size; // motional impedance M
    const mIm = -yIm * size;
    z.re[i]! += re + mRe;
    z.im[i]! += mIm;
    if (!d) continue;
    const back = -qes / re; // ∂M = −M²·(Qes/Re)·∂y
    const tRe = (mRe * mRe - mIm * mIm) * back;
    const tIm = 2 * mRe * mIm * back;
    put(d[0]!, i, re + mRe, mIm);
    const fsRe = spring.fsRe + box.fsRe;
    const fsIm = -x * massFactor + spring.fsIm + box.fsIm;
    put(d[1]!, i, tRe * fsRe - tIm * fsIm, tRe * fsIm + tIm * fsRe);
    put(d[2]!, i, -tRe / qms, -tIm / qms);
    put(d[3]!, i, -mRe, -mIm);
    for (let k = 0; k < suspensionCount; k++) putProduct(d[at + k]!, i, tRe, tIm, spring.dRe[k]!, spring.dIm[k]!);
    if (load.mass) put(d[muAt]!, i, -tIm * x, tRe * x);
    for (let k = 0; k < boxCount; k++) putProduct(d[boxAt + k]!, i, tRe, tIm, box.dRe[k]!, box.dIm[k]!);
  }
}

/** A term of y at one frequency: its value, its derivative by ln fs and by its own scaled parameters. */
interface Slopes {
  re: number;
  im: number;
  fsRe: number;
  fsIm: number;
  readonly dRe: Float64Array;
  readonly dIm: Float64Array;
}
function newSlopes(): Slopes {
  return { re: 0, im: 0, fsRe: 0, fsIm: 0, dRe: new Float64Array(3), dIm: new Float64Array(3) };
}

/** s = 1/(jx·c); ∂s = −s·∂c/c, and ∂s/∂ln fs = s plus the change of c where c knows fs. */
function springTerm(
  suspension: SuspensionModel,
  values: ArrayLike<number>,
  at: number,
  x: number,
  fs: number,
  out: Slopes,
): void {
  if (suspension === 'constant') {
    out.im = -1 / x;
    out.fsIm = out.im;
    return;
  }
  let cRe = 1;
  let cIm = 0;
  let wt = 0;
  if (suspension === 'creep') {
    cRe = 1 - values[at]! * Math.log10(x);
    cIm = (-values[at]! * Math.PI) / (2 * Math.LN10);
  } else {
    wt = 2 * Math.PI * fs * x * values[at + 1]!;
    const size = values[at]! / (1 + wt * wt);
    cRe = 1 + size;
    cIm = -size * wt;
  }
  const size = 1 / (x * (cRe * cRe + cIm * cIm)); // 1/(jxc) = −j·conj(c)/(x|c|²)
  const sRe = -cIm * size;
  const sIm = -cRe * size;
  const inverse = size * x;
  const bRe = -(sRe * cRe + sIm * cIm) * inverse; // b = −s/c
  const bIm = -(sIm * cRe - sRe * cIm) * inverse;
  out.re = sRe;
  out.im = sIm;
  out.fsRe = sRe;
  out.fsIm = sIm;
  if (suspension === 'creep') {
    const lRe = -Math.log10(x); // ∂c/∂λ = −log10(jx)
    const lIm = -Math.PI / (2 * Math.LN10);
    out.fsRe += (bRe * values[at]!) / Math.LN10; // ∂c/∂ln fs = λ/ln 10
    out.fsIm += (bIm * values[at]!) / Math.LN10;
    out.dRe[0] = bRe * lRe - bIm * lIm;
    out.dIm[0] = bRe * lIm + bIm * lRe;
    return;
  }
  const kRe = cRe - 1; // ∂c/∂ln κ = c − 1; ∂c/∂ln τ = −(c − 1)·jωτ/(1 + jωτ)
  const scale = wt / (1 + wt * wt);
  const tRe = -(kRe * wt - cIm) * scale;
  const tIm = -(kRe + cIm * wt) * scale;
  out.dRe[0] = bRe * kRe - bIm * cIm;
  out.dIm[0] = bRe * cIm + bIm * kRe;
  out.dRe[1] = bRe * tRe - bIm * tIm;
  out.dIm[1] = bRe * tIm + bIm * tRe;
}

/** alpha·u with u = 1/v, v = 1/a + g/QL, a = 1/(jx) + 1/(g·QA). */
function boxTerm(values: ArrayLike<number>, at: number, count: number, x: number, out: Slopes): void {
  const alpha = values[at]!;
  const g = Math.sqrt(1 + alpha);
  const leak = count > 1 ? g / values[at + 1]! : 0;
  const loss = count > 2 ? 1 / (g * values[at + 2]!) : 0;
  const aIm = -1 / x;
  const aSize = 1 / (loss * loss + aIm * aIm);
  const nRe = loss * aSize; // 1/a
  const nIm = -aIm * aSize;
  const vRe = nRe + leak;
  const vSize = 1 / (vRe * vRe + nIm * nIm);
  const uRe = vRe * vSize;
  const uIm = -nIm * vSize;
  out.re = alpha * uRe;
  out.im = alpha * uIm;
  const rRe = -alpha * (uRe * uRe - uIm * uIm); // ∂(alpha·u) = −alpha·u²·∂v
  const rIm = -2 * alpha * uRe * uIm;
  const qRe = -(nRe * nRe - nIm * nIm); // ∂v = −∂a/a²
  const qIm = -2 * nRe * nIm;
  const fRe = -qIm * aIm; // ∂a/∂ln fs = 1/(jx)
  const fIm = qRe * aIm;
  out.fsRe = rRe * fRe - rIm * fIm;
  out.fsIm = rRe * fIm + rIm * fRe;
  const growth = alpha / (2 * (1 + alpha)); // ∂ln g/∂ln alpha
  const wRe = growth * (leak - qRe * loss);
  const wIm = -growth * qIm * loss;
  out.dRe[0] = out.re + rRe * wRe - rIm * wIm;
  out.dIm[0] = out.im + rRe * wIm + rIm * wRe;
  out.dRe[1] = -rRe * leak;
  out.dIm[1] = -rIm * leak;
  const lRe = -qRe * loss;
  const lIm = -qIm * loss;
  out.dRe[2] = rRe * lRe - rIm * lIm;
  out.dIm[2] = rRe * lIm + rIm * lRe;
}

function put(column: ComplexArray, i: number, re: number, im: number): void {
  column.re[i] = re;
  column.im[i] = im;
}

function putProduct(column: ComplexArray, i: number, aRe: number, aIm: number, bRe: number, bIm: number): void {
  column.re[i] = aRe * bRe - aIm * bIm;
  column.im[i] = aRe * bIm + aIm * bRe;
}

/** Every column divided by z, in place. */
function divideBy(columns: readonly ComplexArray[], z: ComplexArray): void {
  const n = z.re.length;
  const inverse = complexArray(n);
  for (let i = 0; i < n; i++) {
    const size = 1 / (z.re[i]! * z.re[i]! + z.im[i]! * z.im[i]!);
    put(inverse, i, z.re[i]! * size, -z.im[i]! * size);
  }
  for (const { re, im } of columns) {
    for (let i = 0; i < n; i++) {
      const a = re[i]!;
      const b = im[i]!;
      re[i] = a * inverse.re[i]! - b * inverse.im[i]!;
      im[i] = a * inverse.im[i]! + b * inverse.re[i]!;
    }
  }
}
