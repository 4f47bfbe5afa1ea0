/**
 * Writes calculators/acoustics/kernels/: for each voice-coil and suspension model one loop over a complex free-air sweep that
 * computes the model, ln(Z/Zmodel), its derivatives and the sums JᵀWJ, JᵀWr and cost in one go, everything unrolled into
 * local variables. That is what makes a fit quick; the same mathematics in loops stands in calculators/acoustics/.
 *
 *   node scripts/make-kernels.mjs      writes the files anew; a unit test fails when they are not up to date
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const FOLDER = join(dirname(fileURLToPath(import.meta.url)), '..', 'calculators', 'acoustics', 'kernels');

/**
 * A column of the Jacobian: statements before, its real and imaginary part (in terms of q = √W/Zmodel), and a factor
 * that is the same at every frequency and therefore multiplies the finished sums.
 * @typedef {{ re: string, im: string, factor?: string }} Column
 * @typedef {{ name: string, constants: string[], perPoint: string[], z: [string, string], columns: Column[], arrays: string[] }} Coil
 * @typedef {{ name: string, constants: string[], perPoint: string[], slope: [string, string], spring: [string, string], columns: Column[], arrays: string[] }} Suspension
 */

/** (a + jb)(c + jd). @param {string} a @param {string} b @param {string} c @param {string} d */
const product = (a, b, c, d) => ({ re: `${a} * ${c} - ${b} * ${d}`, im: `${a} * ${d} + ${b} * ${c}` });

/** @type {Coil[]} */
const COILS = [
  {
    name: 'inductor',
    arrays: ['omega'],
    constants: ['const le = v[4]!;'],
    perPoint: ['const w = omega[i]!;'],
    z: ['0', 'w * le'],
    columns: [{ re: '-w * qi', im: 'w * qr', factor: 'le' }],
  },
  {
    name: 'inductorEddy',
    arrays: ['omega'],
    constants: ['const l1 = v[4]!, r2 = v[6]!, tau2 = v[5]! / r2;'],
    perPoint: [
      'const w = omega[i]!, t = w * tau2, t2 = t * t, damp = 1 / (1 + t2), par = r2 * damp;',
      'const eRe = 2 * t * par * damp * t, eIm = par * damp * t * (1 - t2);', // ∂(jωL2 ∥ R2)/∂ln L2
    ],
    z: ['par * t2', 'w * l1 + par * t'],
    columns: [
      { re: '-w * qi', im: 'w * qr', factor: 'l1' },
      product('eRe', 'eIm', 'qr', 'qi'),
      { re: '-t * a5i', im: 't * a5r' }, // ∂/∂ln R2 = jt·∂/∂ln L2
    ],
  },
  {
    name: 'powerLaw',
    arrays: ['logOmegaRatio'],
    constants: [
      'const power = v[5]!, quarter = Math.PI / 2, pc = v[4]! * Math.cos(power * quarter), ps = v[4]! * Math.sin(power * quarter);',
    ],
    perPoint: ['const lg = logOmegaRatio[i]!, size = Math.exp(power * lg), kRe = pc * size, kIm = ps * size;'],
    z: ['kRe', 'kIm'],
    columns: [product('kRe', 'kIm', 'qr', 'qi'), { re: 'lg * a4r - quarter * a4i', im: 'lg * a4i + quarter * a4r' }],
  },
  {
    name: 'splitPowerLaw',
    arrays: ['logOmegaRatio'],
    constants: ['const kr = v[4]!, xr = v[5]!, ki = v[6]!, xi = v[7]!;'],
    perPoint: ['const lg = logOmegaRatio[i]!, kRe = kr * Math.exp(xr * lg), kIm = ki * Math.exp(xi * lg);'],
    z: ['kRe', 'kIm'],
    columns: [
      { re: 'kRe * qr', im: 'kRe * qi' },
      { re: 'lg * a4r', im: 'lg * a4i' },
      { re: '-kIm * qi', im: 'kIm * qr' },
      { re: 'lg * a6r', im: 'lg * a6i' },
    ],
  },
  {
    name: 'semiInductance',
    arrays: ['omega', 'rootHalfOmega'],
    constants: ['const leb = v[4]!, iLe = 1 / v[5]!, iK = 0.5 / v[6]!, gss = v[7]!;'],
    perPoint: [
      'const w = omega[i]!, yl = iLe / w, yk = iK / rootHalfOmega[i]!, pr = yk + gss, pi = -yl - yk;',
      'const par = 1 / (pr * pr + pi * pi), zpr = pr * par, zpi = -pi * par;',
      'const sqr = zpr * zpr - zpi * zpi, sqi = 2 * zpr * zpi;',
    ],
    z: ['zpr', 'w * leb + zpi'],
    columns: [
      { re: '-w * qi', im: 'w * qr', factor: 'leb' },
      { re: 'yl * a7i', im: '-yl * a7r' }, // column 7 stands first in the code: a7 = P²q
      { re: 'yk * (a7r + a7i)', im: 'yk * (a7i - a7r)' },
      { ...product('sqr', 'sqi', 'qr', 'qi'), factor: '-gss' },
    ],
  },
];

/** @type {(at: number) => Suspension[]} */
const suspensions = (at) => [
  {
    name: 'Constant',
    arrays: [],
    constants: [],
    perPoint: [],
    spring: ['0', '-u'],
    slope: ['0', '-x - u'],
    columns: [],
  },
  {
    name: 'Creep',
    arrays: ['logOmegaRatio'],
    constants: [
      `const lambda10 = v[${at}]! / Math.LN10, cIm = (-lambda10 * Math.PI) / 2, cIm2 = cIm * cIm;`,
      'const logFs = Math.log((2 * Math.PI * fs) / REFERENCE_OMEGA), lIm = -Math.PI / 2;',
    ],
    perPoint: [
      'const lRe = logFs - logOmegaRatio[i]!, cRe = 1 + lambda10 * lRe, iC = 1 / (cRe * cRe + cIm2);',
      'const sRe = -u * iC * cIm, sIm = -u * iC * cRe;', // s = 1/(jxc)
      'const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;', // b = −s/c
      'const fRe = sRe + lambda10 * bRe, fIm = sIm - x + lambda10 * bIm;',
      'const cr = bRe * lRe - bIm * lIm, ci = bRe * lIm + bIm * lRe;',
    ],
    spring: ['sRe', 'sIm'],
    slope: ['fRe', 'fIm'],
    columns: [{ ...product('cr', 'ci', 'tr', 'ti'), factor: '(1 / Math.LN10)' }],
  },
  {
    name: 'Relaxing',
    arrays: ['omega'],
    constants: [`const kappa = v[${at}]!, tauS = v[${at + 1}]!;`],
    perPoint: [
      'const wt = omega[i]! * tauS, iT = 1 / (1 + wt * wt), vRe = kappa * iT, cIm = -vRe * wt, cRe = 1 + vRe;',
      'const iC = 1 / (cRe * cRe + cIm * cIm), sRe = -u * iC * cIm, sIm = -u * iC * cRe;',
      'const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;',
      'const ar = bRe * vRe - bIm * cIm, ai = bRe * cIm + bIm * vRe;', // ∂y/∂ln κ
      'const part = -wt * iT, br = part * (ar * wt - ai), bi = part * (ai * wt + ar);', // ∂y/∂ln τ = −that·jωτ/(1 + jωτ)
    ],
    spring: ['sRe', 'sIm'],
    slope: ['sRe', 'sIm - x'],
    columns: [product('ar', 'ai', 'tr', 'ti'), product('br', 'bi', 'tr', 'ti')],
  },
];

/** @param {Coil} coil @param {Suspension} suspension */
function kernel(coil, suspension) {
  /** @type {Column[]} */
  const columns = [
    { re: '(re + mr) * qr - mi * qi', im: '(re + mr) * qi + mi * qr' },
    suspension.name === 'Constant'
      ? { re: '(x + u) * ti', im: '-(x + u) * tr' }
      : product(`(${suspension.slope[0]})`, `(${suspension.slope[1]})`, 'tr', 'ti'),
    { re: 'tr', im: 'ti', factor: '(-1 / qms)' },
    { ...product('mr', 'mi', 'qr', 'qi'), factor: '-1' },
    ...coil.columns,
    ...suspension.columns,
  ];
  const p = columns.length;
  const order = columns.map((_, k) => k);
  if (coil.name === 'semiInductance') order.splice(4, 4, 7, 4, 5, 6);
  const arrays = [...new Set(['frequencyHz', 'period', ...coil.arrays, ...suspension.arrays])];
  const pairs = columns.flatMap((_, k) => columns.slice(0, k + 1).map((__, l) => [k, l]));
  const factor = (/** @type {number} */ k) => columns[k]?.factor ?? '1';
  const times = (/** @type {number[]} */ ks) =>
    ks
      .map(factor)
      .filter((f) => f !== '1')
      .map((f) => ` * ${f}`)
      .join('');
  const chunk = (/** @type {string[]} */ items, size = 10) =>
    Array.from({ length: Math.ceil(items.length / size) }, (_, i) => items.slice(i * size, (i + 1) * size).join(', '));
  const springRe = suspension.spring[0] === '0' ? 'iQms' : `iQms + ${suspension.spring[0]}`;
  const springIm = suspension.spring[1].startsWith('-')
    ? `x ${suspension.spring[1].replace('-', '- ')}`
    : `x + ${suspension.spring[1]}`;
  return `
export function ${coil.name}${suspension.name}(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { ${arrays.join(', ')} } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
${[...coil.constants, ...suspension.constants].map((line) => `  ${line}`).join('\n')}
  let cost = 0;
${chunk(order.map((k) => `g${k} = 0`))
  .map((line) => `  let ${line};`)
  .join('\n')}
${chunk(pairs.map(([k, l]) => `h${k}_${l} = 0`))
  .map((line) => `  let ${line};`)
  .join('\n')}
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
${[...suspension.perPoint, ...coil.perPoint].map((line) => `    ${line}`).join('\n')}
    const yr = ${springRe}, yi = ${springIm}, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr${coil.z[0] === '0' ? '' : ` + ${coil.z[0]}`}, zi = mi + ${coil.z[1]}, iZ = 1 / (zr * zr + zi * zi);
    const ur = zr * iZ, ui = -zi * iZ, dr = zRe[i]!, di = zIm[i]!, er = dr * ur - di * ui - 1, ei = dr * ui + di * ur;
    const er2 = 2 + er, iE = 1 / (er2 * er2 + ei * ei), sr = (er * er2 + ei * ei) * iE, si = 2 * ei * iE;
    const s2r = sr * sr - si * si, s2i = 2 * sr * si;
    let rr: number, ri: number;
    if (s2r * s2r + s2i * s2i < 1e-5) {
      let pr = 1 / 7 + s2r / 9, pi = s2i / 9, keep = pr;
      pr = 1 / 5 + s2r * pr - s2i * pi; pi = s2r * pi + s2i * keep; keep = pr;
      pr = 1 / 3 + s2r * pr - s2i * pi; pi = s2r * pi + s2i * keep; keep = pr;
      pr = 1 + s2r * pr - s2i * pi; pi = s2r * pi + s2i * keep;
      rr = 2 * (sr * pr - si * pi); ri = 2 * (sr * pi + si * pr);
    } else {
      rr = 0.5 * Math.log((er + 1) * (er + 1) + ei * ei); ri = Math.atan2(ei, er + 1);
    }
    let root = weight;
    if (isLinear) cost += weight * weight * (rr * rr + ri * ri);
    else {
      const z = weight * weight * (rr * rr + ri * ri) * iC2;
      cost += c2 * lossValue(loss.kind, z); root *= Math.sqrt(lossWeight(loss.kind, z));
    }
    const qr = ur * root, qi = ui * root, wr = rr * root, wi = ri * root;
    const m2r = (mr * mr - mi * mi) * iAmp, m2i = 2 * mr * mi * iAmp, tr = m2r * qr - m2i * qi, ti = m2r * qi + m2i * qr;
${order.map((k) => `    const a${k}r = ${columns[k]?.re}, a${k}i = ${columns[k]?.im};`).join('\n')}
${chunk(
  order.map((k) => `g${k} -= a${k}r * wr + a${k}i * wi`),
  3,
)
  .map((line) => `    ${line.replaceAll(', ', '; ')};`)
  .join('\n')}
${chunk(
  pairs.map(([k, l]) => `h${k}_${l} += a${k}r * a${l}r + a${k}i * a${l}i`),
  3,
)
  .map((line) => `    ${line.replaceAll(', ', '; ')};`)
  .join('\n')}
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
${chunk(
  order.map((k) => `g[${k}] = g${k}${times([k])}`),
  5,
)
  .map((line) => `  ${line.replaceAll(', ', '; ')};`)
  .join('\n')}
${chunk(
  pairs.map(([k = 0, l = 0]) => `h[${k * p + l}] = h${k}_${l}${times([k, l])}`),
  5,
)
  .map((line) => `  ${line.replaceAll(', ', '; ')};`)
  .join('\n')}
}
`;
}

const kebab = (/** @type {string} */ name) => name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`);

/** The text of every file by its name. @returns {Map<string, string>} */
export function kernelFiles() {
  return new Map(
    COILS.map((coil) => {
      const laws = suspensions(4 + coil.columns.length);
      const text = laws.map((law) => kernel(coil, law)).join('');
      const head = [
        '// Written by scripts/make-kernels.mjs; change that, not this.',
        "import type { NormalSums } from '../../numerics/least-squares-problem.js';",
        "import { type Loss, lossValue, lossWeight } from '../../numerics/losses.js';",
        "import { REFERENCE_OMEGA } from '../frequency-grid.js';",
        "import type { KernelData } from '../kernel-data.js';",
      ];
      return [`${kebab(coil.name)}.ts`, `${head.join('\n')}\n${text}`];
    }),
  );
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  mkdirSync(FOLDER, { recursive: true });
  for (const [name, text] of kernelFiles()) writeFileSync(join(FOLDER, name), text);
}
