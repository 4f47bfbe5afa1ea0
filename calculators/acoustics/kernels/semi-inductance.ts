// Written by scripts/make-kernels.mjs; change that, not this.
import type { NormalSums } from '../../numerics/least-squares-problem.js';
import { type Loss, lossValue, lossWeight } from '../../numerics/losses.js';
import { REFERENCE_OMEGA } from '../frequency-grid.js';
import type { KernelData } from '../kernel-data.js';

export function semiInductanceConstant(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega, rootHalfOmega } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const leb = v[4]!, iLe = 1 / v[5]!, iK = 0.5 / v[6]!, gss = v[7]!;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g7 = 0, g4 = 0, g5 = 0, g6 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0, h5_0 = 0, h5_1 = 0, h5_2 = 0, h5_3 = 0, h5_4 = 0;
  let h5_5 = 0, h6_0 = 0, h6_1 = 0, h6_2 = 0, h6_3 = 0, h6_4 = 0, h6_5 = 0, h6_6 = 0, h7_0 = 0, h7_1 = 0;
  let h7_2 = 0, h7_3 = 0, h7_4 = 0, h7_5 = 0, h7_6 = 0, h7_7 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const w = omega[i]!, yl = iLe / w, yk = iK / rootHalfOmega[i]!, pr = yk + gss, pi = -yl - yk;
    const par = 1 / (pr * pr + pi * pi), zpr = pr * par, zpi = -pi * par;
    const sqr = zpr * zpr - zpi * zpi, sqi = 2 * zpr * zpi;
    const yr = iQms, yi = x - u, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr + zpr, zi = mi + w * leb + zpi, iZ = 1 / (zr * zr + zi * zi);
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
    const a0r = (re + mr) * qr - mi * qi, a0i = (re + mr) * qi + mi * qr;
    const a1r = (x + u) * ti, a1i = -(x + u) * tr;
    const a2r = tr, a2i = ti;
    const a3r = mr * qr - mi * qi, a3i = mr * qi + mi * qr;
    const a7r = sqr * qr - sqi * qi, a7i = sqr * qi + sqi * qr;
    const a4r = -w * qi, a4i = w * qr;
    const a5r = yl * a7i, a5i = -yl * a7r;
    const a6r = yk * (a7r + a7i), a6i = yk * (a7i - a7r);
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g7 -= a7r * wr + a7i * wi; g4 -= a4r * wr + a4i * wi;
    g5 -= a5r * wr + a5i * wi; g6 -= a6r * wr + a6i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
    h5_0 += a5r * a0r + a5i * a0i; h5_1 += a5r * a1r + a5i * a1i; h5_2 += a5r * a2r + a5i * a2i;
    h5_3 += a5r * a3r + a5i * a3i; h5_4 += a5r * a4r + a5i * a4i; h5_5 += a5r * a5r + a5i * a5i;
    h6_0 += a6r * a0r + a6i * a0i; h6_1 += a6r * a1r + a6i * a1i; h6_2 += a6r * a2r + a6i * a2i;
    h6_3 += a6r * a3r + a6i * a3i; h6_4 += a6r * a4r + a6i * a4i; h6_5 += a6r * a5r + a6i * a5i;
    h6_6 += a6r * a6r + a6i * a6i; h7_0 += a7r * a0r + a7i * a0i; h7_1 += a7r * a1r + a7i * a1i;
    h7_2 += a7r * a2r + a7i * a2i; h7_3 += a7r * a3r + a7i * a3i; h7_4 += a7r * a4r + a7i * a4i;
    h7_5 += a7r * a5r + a7i * a5i; h7_6 += a7r * a6r + a7i * a6i; h7_7 += a7r * a7r + a7i * a7i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[7] = g7 * -gss;
  g[4] = g4 * leb; g[5] = g5; g[6] = g6;
  h[0] = h0_0; h[8] = h1_0; h[9] = h1_1; h[16] = h2_0 * (-1 / qms); h[17] = h2_1 * (-1 / qms);
  h[18] = h2_2 * (-1 / qms) * (-1 / qms); h[24] = h3_0 * -1; h[25] = h3_1 * -1; h[26] = h3_2 * -1 * (-1 / qms); h[27] = h3_3 * -1 * -1;
  h[32] = h4_0 * leb; h[33] = h4_1 * leb; h[34] = h4_2 * leb * (-1 / qms); h[35] = h4_3 * leb * -1; h[36] = h4_4 * leb * leb;
  h[40] = h5_0; h[41] = h5_1; h[42] = h5_2 * (-1 / qms); h[43] = h5_3 * -1; h[44] = h5_4 * leb;
  h[45] = h5_5; h[48] = h6_0; h[49] = h6_1; h[50] = h6_2 * (-1 / qms); h[51] = h6_3 * -1;
  h[52] = h6_4 * leb; h[53] = h6_5; h[54] = h6_6; h[56] = h7_0 * -gss; h[57] = h7_1 * -gss;
  h[58] = h7_2 * -gss * (-1 / qms); h[59] = h7_3 * -gss * -1; h[60] = h7_4 * -gss * leb; h[61] = h7_5 * -gss; h[62] = h7_6 * -gss;
  h[63] = h7_7 * -gss * -gss;
}

export function semiInductanceCreep(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega, rootHalfOmega, logOmegaRatio } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const leb = v[4]!, iLe = 1 / v[5]!, iK = 0.5 / v[6]!, gss = v[7]!;
  const lambda10 = v[8]! / Math.LN10, cIm = (-lambda10 * Math.PI) / 2, cIm2 = cIm * cIm;
  const logFs = Math.log((2 * Math.PI * fs) / REFERENCE_OMEGA), lIm = -Math.PI / 2;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g7 = 0, g4 = 0, g5 = 0, g6 = 0, g8 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0, h5_0 = 0, h5_1 = 0, h5_2 = 0, h5_3 = 0, h5_4 = 0;
  let h5_5 = 0, h6_0 = 0, h6_1 = 0, h6_2 = 0, h6_3 = 0, h6_4 = 0, h6_5 = 0, h6_6 = 0, h7_0 = 0, h7_1 = 0;
  let h7_2 = 0, h7_3 = 0, h7_4 = 0, h7_5 = 0, h7_6 = 0, h7_7 = 0, h8_0 = 0, h8_1 = 0, h8_2 = 0, h8_3 = 0;
  let h8_4 = 0, h8_5 = 0, h8_6 = 0, h8_7 = 0, h8_8 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const lRe = logFs - logOmegaRatio[i]!, cRe = 1 + lambda10 * lRe, iC = 1 / (cRe * cRe + cIm2);
    const sRe = -u * iC * cIm, sIm = -u * iC * cRe;
    const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;
    const fRe = sRe + lambda10 * bRe, fIm = sIm - x + lambda10 * bIm;
    const cr = bRe * lRe - bIm * lIm, ci = bRe * lIm + bIm * lRe;
    const w = omega[i]!, yl = iLe / w, yk = iK / rootHalfOmega[i]!, pr = yk + gss, pi = -yl - yk;
    const par = 1 / (pr * pr + pi * pi), zpr = pr * par, zpi = -pi * par;
    const sqr = zpr * zpr - zpi * zpi, sqi = 2 * zpr * zpi;
    const yr = iQms + sRe, yi = x + sIm, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr + zpr, zi = mi + w * leb + zpi, iZ = 1 / (zr * zr + zi * zi);
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
    const a0r = (re + mr) * qr - mi * qi, a0i = (re + mr) * qi + mi * qr;
    const a1r = (fRe) * tr - (fIm) * ti, a1i = (fRe) * ti + (fIm) * tr;
    const a2r = tr, a2i = ti;
    const a3r = mr * qr - mi * qi, a3i = mr * qi + mi * qr;
    const a7r = sqr * qr - sqi * qi, a7i = sqr * qi + sqi * qr;
    const a4r = -w * qi, a4i = w * qr;
    const a5r = yl * a7i, a5i = -yl * a7r;
    const a6r = yk * (a7r + a7i), a6i = yk * (a7i - a7r);
    const a8r = cr * tr - ci * ti, a8i = cr * ti + ci * tr;
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g7 -= a7r * wr + a7i * wi; g4 -= a4r * wr + a4i * wi;
    g5 -= a5r * wr + a5i * wi; g6 -= a6r * wr + a6i * wi; g8 -= a8r * wr + a8i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
    h5_0 += a5r * a0r + a5i * a0i; h5_1 += a5r * a1r + a5i * a1i; h5_2 += a5r * a2r + a5i * a2i;
    h5_3 += a5r * a3r + a5i * a3i; h5_4 += a5r * a4r + a5i * a4i; h5_5 += a5r * a5r + a5i * a5i;
    h6_0 += a6r * a0r + a6i * a0i; h6_1 += a6r * a1r + a6i * a1i; h6_2 += a6r * a2r + a6i * a2i;
    h6_3 += a6r * a3r + a6i * a3i; h6_4 += a6r * a4r + a6i * a4i; h6_5 += a6r * a5r + a6i * a5i;
    h6_6 += a6r * a6r + a6i * a6i; h7_0 += a7r * a0r + a7i * a0i; h7_1 += a7r * a1r + a7i * a1i;
    h7_2 += a7r * a2r + a7i * a2i; h7_3 += a7r * a3r + a7i * a3i; h7_4 += a7r * a4r + a7i * a4i;
    h7_5 += a7r * a5r + a7i * a5i; h7_6 += a7r * a6r + a7i * a6i; h7_7 += a7r * a7r + a7i * a7i;
    h8_0 += a8r * a0r + a8i * a0i; h8_1 += a8r * a1r + a8i * a1i; h8_2 += a8r * a2r + a8i * a2i;
    h8_3 += a8r * a3r + a8i * a3i; h8_4 += a8r * a4r + a8i * a4i; h8_5 += a8r * a5r + a8i * a5i;
    h8_6 += a8r * a6r + a8i * a6i; h8_7 += a8r * a7r + a8i * a7i; h8_8 += a8r * a8r + a8i * a8i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[7] = g7 * -gss;
  g[4] = g4 * leb; g[5] = g5; g[6] = g6; g[8] = g8 * (1 / Math.LN10);
  h[0] = h0_0; h[9] = h1_0; h[10] = h1_1; h[18] = h2_0 * (-1 / qms); h[19] = h2_1 * (-1 / qms);
  h[20] = h2_2 * (-1 / qms) * (-1 / qms); h[27] = h3_0 * -1; h[28] = h3_1 * -1; h[29] = h3_2 * -1 * (-1 / qms); h[30] = h3_3 * -1 * -1;
  h[36] = h4_0 * leb; h[37] = h4_1 * leb; h[38] = h4_2 * leb * (-1 / qms); h[39] = h4_3 * leb * -1; h[40] = h4_4 * leb * leb;
  h[45] = h5_0; h[46] = h5_1; h[47] = h5_2 * (-1 / qms); h[48] = h5_3 * -1; h[49] = h5_4 * leb;
  h[50] = h5_5; h[54] = h6_0; h[55] = h6_1; h[56] = h6_2 * (-1 / qms); h[57] = h6_3 * -1;
  h[58] = h6_4 * leb; h[59] = h6_5; h[60] = h6_6; h[63] = h7_0 * -gss; h[64] = h7_1 * -gss;
  h[65] = h7_2 * -gss * (-1 / qms); h[66] = h7_3 * -gss * -1; h[67] = h7_4 * -gss * leb; h[68] = h7_5 * -gss; h[69] = h7_6 * -gss;
  h[70] = h7_7 * -gss * -gss; h[72] = h8_0 * (1 / Math.LN10); h[73] = h8_1 * (1 / Math.LN10); h[74] = h8_2 * (1 / Math.LN10) * (-1 / qms); h[75] = h8_3 * (1 / Math.LN10) * -1;
  h[76] = h8_4 * (1 / Math.LN10) * leb; h[77] = h8_5 * (1 / Math.LN10); h[78] = h8_6 * (1 / Math.LN10); h[79] = h8_7 * (1 / Math.LN10) * -gss; h[80] = h8_8 * (1 / Math.LN10) * (1 / Math.LN10);
}

export function semiInductanceRelaxing(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega, rootHalfOmega } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const leb = v[4]!, iLe = 1 / v[5]!, iK = 0.5 / v[6]!, gss = v[7]!;
  const kappa = v[8]!, tauS = v[9]!;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g7 = 0, g4 = 0, g5 = 0, g6 = 0, g8 = 0, g9 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0, h5_0 = 0, h5_1 = 0, h5_2 = 0, h5_3 = 0, h5_4 = 0;
  let h5_5 = 0, h6_0 = 0, h6_1 = 0, h6_2 = 0, h6_3 = 0, h6_4 = 0, h6_5 = 0, h6_6 = 0, h7_0 = 0, h7_1 = 0;
  let h7_2 = 0, h7_3 = 0, h7_4 = 0, h7_5 = 0, h7_6 = 0, h7_7 = 0, h8_0 = 0, h8_1 = 0, h8_2 = 0, h8_3 = 0;
  let h8_4 = 0, h8_5 = 0, h8_6 = 0, h8_7 = 0, h8_8 = 0, h9_0 = 0, h9_1 = 0, h9_2 = 0, h9_3 = 0, h9_4 = 0;
  let h9_5 = 0, h9_6 = 0, h9_7 = 0, h9_8 = 0, h9_9 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const wt = omega[i]! * tauS, iT = 1 / (1 + wt * wt), vRe = kappa * iT, cIm = -vRe * wt, cRe = 1 + vRe;
    const iC = 1 / (cRe * cRe + cIm * cIm), sRe = -u * iC * cIm, sIm = -u * iC * cRe;
    const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;
    const ar = bRe * vRe - bIm * cIm, ai = bRe * cIm + bIm * vRe;
    const part = -wt * iT, br = part * (ar * wt - ai), bi = part * (ai * wt + ar);
    const w = omega[i]!, yl = iLe / w, yk = iK / rootHalfOmega[i]!, pr = yk + gss, pi = -yl - yk;
    const par = 1 / (pr * pr + pi * pi), zpr = pr * par, zpi = -pi * par;
    const sqr = zpr * zpr - zpi * zpi, sqi = 2 * zpr * zpi;
    const yr = iQms + sRe, yi = x + sIm, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr + zpr, zi = mi + w * leb + zpi, iZ = 1 / (zr * zr + zi * zi);
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
    const a0r = (re + mr) * qr - mi * qi, a0i = (re + mr) * qi + mi * qr;
    const a1r = (sRe) * tr - (sIm - x) * ti, a1i = (sRe) * ti + (sIm - x) * tr;
    const a2r = tr, a2i = ti;
    const a3r = mr * qr - mi * qi, a3i = mr * qi + mi * qr;
    const a7r = sqr * qr - sqi * qi, a7i = sqr * qi + sqi * qr;
    const a4r = -w * qi, a4i = w * qr;
    const a5r = yl * a7i, a5i = -yl * a7r;
    const a6r = yk * (a7r + a7i), a6i = yk * (a7i - a7r);
    const a8r = ar * tr - ai * ti, a8i = ar * ti + ai * tr;
    const a9r = br * tr - bi * ti, a9i = br * ti + bi * tr;
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g7 -= a7r * wr + a7i * wi; g4 -= a4r * wr + a4i * wi;
    g5 -= a5r * wr + a5i * wi; g6 -= a6r * wr + a6i * wi; g8 -= a8r * wr + a8i * wi;
    g9 -= a9r * wr + a9i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
    h5_0 += a5r * a0r + a5i * a0i; h5_1 += a5r * a1r + a5i * a1i; h5_2 += a5r * a2r + a5i * a2i;
    h5_3 += a5r * a3r + a5i * a3i; h5_4 += a5r * a4r + a5i * a4i; h5_5 += a5r * a5r + a5i * a5i;
    h6_0 += a6r * a0r + a6i * a0i; h6_1 += a6r * a1r + a6i * a1i; h6_2 += a6r * a2r + a6i * a2i;
    h6_3 += a6r * a3r + a6i * a3i; h6_4 += a6r * a4r + a6i * a4i; h6_5 += a6r * a5r + a6i * a5i;
    h6_6 += a6r * a6r + a6i * a6i; h7_0 += a7r * a0r + a7i * a0i; h7_1 += a7r * a1r + a7i * a1i;
    h7_2 += a7r * a2r + a7i * a2i; h7_3 += a7r * a3r + a7i * a3i; h7_4 += a7r * a4r + a7i * a4i;
    h7_5 += a7r * a5r + a7i * a5i; h7_6 += a7r * a6r + a7i * a6i; h7_7 += a7r * a7r + a7i * a7i;
    h8_0 += a8r * a0r + a8i * a0i; h8_1 += a8r * a1r + a8i * a1i; h8_2 += a8r * a2r + a8i * a2i;
    h8_3 += a8r * a3r + a8i * a3i; h8_4 += a8r * a4r + a8i * a4i; h8_5 += a8r * a5r + a8i * a5i;
    h8_6 += a8r * a6r + a8i * a6i; h8_7 += a8r * a7r + a8i * a7i; h8_8 += a8r * a8r + a8i * a8i;
    h9_0 += a9r * a0r + a9i * a0i; h9_1 += a9r * a1r + a9i * a1i; h9_2 += a9r * a2r + a9i * a2i;
    h9_3 += a9r * a3r + a9i * a3i; h9_4 += a9r * a4r + a9i * a4i; h9_5 += a9r * a5r + a9i * a5i;
    h9_6 += a9r * a6r + a9i * a6i; h9_7 += a9r * a7r + a9i * a7i; h9_8 += a9r * a8r + a9i * a8i;
    h9_9 += a9r * a9r + a9i * a9i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[7] = g7 * -gss;
  g[4] = g4 * leb; g[5] = g5; g[6] = g6; g[8] = g8; g[9] = g9;
  h[0] = h0_0; h[10] = h1_0; h[11] = h1_1; h[20] = h2_0 * (-1 / qms); h[21] = h2_1 * (-1 / qms);
  h[22] = h2_2 * (-1 / qms) * (-1 / qms); h[30] = h3_0 * -1; h[31] = h3_1 * -1; h[32] = h3_2 * -1 * (-1 / qms); h[33] = h3_3 * -1 * -1;
  h[40] = h4_0 * leb; h[41] = h4_1 * leb; h[42] = h4_2 * leb * (-1 / qms); h[43] = h4_3 * leb * -1; h[44] = h4_4 * leb * leb;
  h[50] = h5_0; h[51] = h5_1; h[52] = h5_2 * (-1 / qms); h[53] = h5_3 * -1; h[54] = h5_4 * leb;
  h[55] = h5_5; h[60] = h6_0; h[61] = h6_1; h[62] = h6_2 * (-1 / qms); h[63] = h6_3 * -1;
  h[64] = h6_4 * leb; h[65] = h6_5; h[66] = h6_6; h[70] = h7_0 * -gss; h[71] = h7_1 * -gss;
  h[72] = h7_2 * -gss * (-1 / qms); h[73] = h7_3 * -gss * -1; h[74] = h7_4 * -gss * leb; h[75] = h7_5 * -gss; h[76] = h7_6 * -gss;
  h[77] = h7_7 * -gss * -gss; h[80] = h8_0; h[81] = h8_1; h[82] = h8_2 * (-1 / qms); h[83] = h8_3 * -1;
  h[84] = h8_4 * leb; h[85] = h8_5; h[86] = h8_6; h[87] = h8_7 * -gss; h[88] = h8_8;
  h[90] = h9_0; h[91] = h9_1; h[92] = h9_2 * (-1 / qms); h[93] = h9_3 * -1; h[94] = h9_4 * leb;
  h[95] = h9_5; h[96] = h9_6; h[97] = h9_7 * -gss; h[98] = h9_8; h[99] = h9_9;
}
