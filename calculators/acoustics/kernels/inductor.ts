// Written by scripts/make-kernels.mjs; change that, not this.
import type { NormalSums } from '../../numerics/least-squares-problem.js';
import { type Loss, lossValue, lossWeight } from '../../numerics/losses.js';
import { REFERENCE_OMEGA } from '../frequency-grid.js';
import type { KernelData } from '../kernel-data.js';

export function inductorConstant(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const le = v[4]!;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g4 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const w = omega[i]!;
    const yr = iQms, yi = x - u, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr, zi = mi + w * le, iZ = 1 / (zr * zr + zi * zi);
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
    const a4r = -w * qi, a4i = w * qr;
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g4 -= a4r * wr + a4i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[4] = g4 * le;
  h[0] = h0_0; h[5] = h1_0; h[6] = h1_1; h[10] = h2_0 * (-1 / qms); h[11] = h2_1 * (-1 / qms);
  h[12] = h2_2 * (-1 / qms) * (-1 / qms); h[15] = h3_0 * -1; h[16] = h3_1 * -1; h[17] = h3_2 * -1 * (-1 / qms); h[18] = h3_3 * -1 * -1;
  h[20] = h4_0 * le; h[21] = h4_1 * le; h[22] = h4_2 * le * (-1 / qms); h[23] = h4_3 * le * -1; h[24] = h4_4 * le * le;
}

export function inductorCreep(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega, logOmegaRatio } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const le = v[4]!;
  const lambda10 = v[5]! / Math.LN10, cIm = (-lambda10 * Math.PI) / 2, cIm2 = cIm * cIm;
  const logFs = Math.log((2 * Math.PI * fs) / REFERENCE_OMEGA), lIm = -Math.PI / 2;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g4 = 0, g5 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0, h5_0 = 0, h5_1 = 0, h5_2 = 0, h5_3 = 0, h5_4 = 0;
  let h5_5 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const lRe = logFs - logOmegaRatio[i]!, cRe = 1 + lambda10 * lRe, iC = 1 / (cRe * cRe + cIm2);
    const sRe = -u * iC * cIm, sIm = -u * iC * cRe;
    const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;
    const fRe = sRe + lambda10 * bRe, fIm = sIm - x + lambda10 * bIm;
    const cr = bRe * lRe - bIm * lIm, ci = bRe * lIm + bIm * lRe;
    const w = omega[i]!;
    const yr = iQms + sRe, yi = x + sIm, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr, zi = mi + w * le, iZ = 1 / (zr * zr + zi * zi);
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
    const a4r = -w * qi, a4i = w * qr;
    const a5r = cr * tr - ci * ti, a5i = cr * ti + ci * tr;
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g4 -= a4r * wr + a4i * wi; g5 -= a5r * wr + a5i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
    h5_0 += a5r * a0r + a5i * a0i; h5_1 += a5r * a1r + a5i * a1i; h5_2 += a5r * a2r + a5i * a2i;
    h5_3 += a5r * a3r + a5i * a3i; h5_4 += a5r * a4r + a5i * a4i; h5_5 += a5r * a5r + a5i * a5i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[4] = g4 * le;
  g[5] = g5 * (1 / Math.LN10);
  h[0] = h0_0; h[6] = h1_0; h[7] = h1_1; h[12] = h2_0 * (-1 / qms); h[13] = h2_1 * (-1 / qms);
  h[14] = h2_2 * (-1 / qms) * (-1 / qms); h[18] = h3_0 * -1; h[19] = h3_1 * -1; h[20] = h3_2 * -1 * (-1 / qms); h[21] = h3_3 * -1 * -1;
  h[24] = h4_0 * le; h[25] = h4_1 * le; h[26] = h4_2 * le * (-1 / qms); h[27] = h4_3 * le * -1; h[28] = h4_4 * le * le;
  h[30] = h5_0 * (1 / Math.LN10); h[31] = h5_1 * (1 / Math.LN10); h[32] = h5_2 * (1 / Math.LN10) * (-1 / qms); h[33] = h5_3 * (1 / Math.LN10) * -1; h[34] = h5_4 * (1 / Math.LN10) * le;
  h[35] = h5_5 * (1 / Math.LN10) * (1 / Math.LN10);
}

export function inductorRelaxing(v: ArrayLike<number>, data: KernelData, weights: Float64Array, loss: Loss, out: NormalSums): void {
  const { frequencyHz, period, omega } = data.grid, zRe = data.re, zIm = data.im, n = weights.length;
  const re = v[0]!, fs = v[1]!, qms = v[2]!, iFs = 1 / fs, iQms = 1 / qms, amp = re / v[3]!, iAmp = -1 / amp;
  const isLinear = loss.kind === 'linear', c2 = loss.scale * loss.scale, iC2 = 1 / c2;
  const le = v[4]!;
  const kappa = v[5]!, tauS = v[6]!;
  let cost = 0;
  let g0 = 0, g1 = 0, g2 = 0, g3 = 0, g4 = 0, g5 = 0, g6 = 0;
  let h0_0 = 0, h1_0 = 0, h1_1 = 0, h2_0 = 0, h2_1 = 0, h2_2 = 0, h3_0 = 0, h3_1 = 0, h3_2 = 0, h3_3 = 0;
  let h4_0 = 0, h4_1 = 0, h4_2 = 0, h4_3 = 0, h4_4 = 0, h5_0 = 0, h5_1 = 0, h5_2 = 0, h5_3 = 0, h5_4 = 0;
  let h5_5 = 0, h6_0 = 0, h6_1 = 0, h6_2 = 0, h6_3 = 0, h6_4 = 0, h6_5 = 0, h6_6 = 0;
  for (let i = 0; i < n; i++) {
    const weight = weights[i]!;
    if (weight === 0) continue;
    const x = frequencyHz[i]! * iFs, u = period[i]! * fs;
    const wt = omega[i]! * tauS, iT = 1 / (1 + wt * wt), vRe = kappa * iT, cIm = -vRe * wt, cRe = 1 + vRe;
    const iC = 1 / (cRe * cRe + cIm * cIm), sRe = -u * iC * cIm, sIm = -u * iC * cRe;
    const bRe = -(sRe * cRe + sIm * cIm) * iC, bIm = -(sIm * cRe - sRe * cIm) * iC;
    const ar = bRe * vRe - bIm * cIm, ai = bRe * cIm + bIm * vRe;
    const part = -wt * iT, br = part * (ar * wt - ai), bi = part * (ai * wt + ar);
    const w = omega[i]!;
    const yr = iQms + sRe, yi = x + sIm, iY = amp / (yr * yr + yi * yi), mr = yr * iY, mi = -yi * iY;
    const zr = re + mr, zi = mi + w * le, iZ = 1 / (zr * zr + zi * zi);
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
    const a4r = -w * qi, a4i = w * qr;
    const a5r = ar * tr - ai * ti, a5i = ar * ti + ai * tr;
    const a6r = br * tr - bi * ti, a6i = br * ti + bi * tr;
    g0 -= a0r * wr + a0i * wi; g1 -= a1r * wr + a1i * wi; g2 -= a2r * wr + a2i * wi;
    g3 -= a3r * wr + a3i * wi; g4 -= a4r * wr + a4i * wi; g5 -= a5r * wr + a5i * wi;
    g6 -= a6r * wr + a6i * wi;
    h0_0 += a0r * a0r + a0i * a0i; h1_0 += a1r * a0r + a1i * a0i; h1_1 += a1r * a1r + a1i * a1i;
    h2_0 += a2r * a0r + a2i * a0i; h2_1 += a2r * a1r + a2i * a1i; h2_2 += a2r * a2r + a2i * a2i;
    h3_0 += a3r * a0r + a3i * a0i; h3_1 += a3r * a1r + a3i * a1i; h3_2 += a3r * a2r + a3i * a2i;
    h3_3 += a3r * a3r + a3i * a3i; h4_0 += a4r * a0r + a4i * a0i; h4_1 += a4r * a1r + a4i * a1i;
    h4_2 += a4r * a2r + a4i * a2i; h4_3 += a4r * a3r + a4i * a3i; h4_4 += a4r * a4r + a4i * a4i;
    h5_0 += a5r * a0r + a5i * a0i; h5_1 += a5r * a1r + a5i * a1i; h5_2 += a5r * a2r + a5i * a2i;
    h5_3 += a5r * a3r + a5i * a3i; h5_4 += a5r * a4r + a5i * a4i; h5_5 += a5r * a5r + a5i * a5i;
    h6_0 += a6r * a0r + a6i * a0i; h6_1 += a6r * a1r + a6i * a1i; h6_2 += a6r * a2r + a6i * a2i;
    h6_3 += a6r * a3r + a6i * a3i; h6_4 += a6r * a4r + a6i * a4i; h6_5 += a6r * a5r + a6i * a5i;
    h6_6 += a6r * a6r + a6i * a6i;
  }
  out.cost = 0.5 * cost;
  const g = out.gradient, h = out.hessian;
  g[0] = g0; g[1] = g1; g[2] = g2 * (-1 / qms); g[3] = g3 * -1; g[4] = g4 * le;
  g[5] = g5; g[6] = g6;
  h[0] = h0_0; h[7] = h1_0; h[8] = h1_1; h[14] = h2_0 * (-1 / qms); h[15] = h2_1 * (-1 / qms);
  h[16] = h2_2 * (-1 / qms) * (-1 / qms); h[21] = h3_0 * -1; h[22] = h3_1 * -1; h[23] = h3_2 * -1 * (-1 / qms); h[24] = h3_3 * -1 * -1;
  h[28] = h4_0 * le; h[29] = h4_1 * le; h[30] = h4_2 * le * (-1 / qms); h[31] = h4_3 * le * -1; h[32] = h4_4 * le * le;
  h[35] = h5_0; h[36] = h5_1; h[37] = h5_2 * (-1 / qms); h[38] = h5_3 * -1; h[39] = h5_4 * le;
  h[40] = h5_5; h[42] = h6_0; h[43] = h6_1; h[44] = h6_2 * (-1 / qms); h[45] = h6_3 * -1;
  h[46] = h6_4 * le; h[47] = h6_5; h[48] = h6_6;
}
