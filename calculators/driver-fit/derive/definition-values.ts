import { relativeCompliance, suspensionParameters } from '../../acoustics/suspension.js';
import type { ModelChoice } from '../fitting/candidates.js';
import { threePoint } from '../report/three-point.js';

/** What hangs on the cone while the three points are read: mu = m/Mms, alpha of a closed box. */
export interface ConeLoad {
  readonly mu: number;
  readonly alpha: number;
}
export interface DefinitionValues {
  readonly fsHz: number;
  readonly qms: number;
  readonly qes: number;
  readonly qts: number;
}

const POINTS = 240;
const REACH = 1.6; // natural logarithm: a factor of 5 on each side

/**
 * The three-point method on the fitted motional impedance, Re + (Re/Qes)/y, without the coil: what the definition gives
 * where the suspension creeps and the parameters of the model mean something else (fs that of the quick spring, Qms
 * without the creep's loss). With a constant suspension both are the same. Null where the flanks are not reached.
 * `local`: free-air parameters in the order of `driverParameters`.
 */
export function definitionValues(
  choice: ModelChoice,
  local: ArrayLike<number>,
  load: ConeLoad,
): DefinitionValues | null {
  const [re = 1, fs = 1, qms = 1, qes = 1] = Array.from({ length: 4 }, (_, k) => local[k] ?? 1);
  const first = local.length - suspensionParameters(choice.suspension).length;
  const centre = 0.5 * Math.log((1 + load.alpha) / (1 + load.mu));
  const frequencyHz = new Float64Array(POINTS);
  const magnitudeOhm = new Float64Array(POINTS);
  let top = 0;
  for (let i = 0; i < POINTS; i += 1) {
    // finer near the resonance, where the top is read
    const place = (2 * i) / (POINTS - 1) - 1;
    const f = fs * Math.exp(centre + REACH * place * (0.15 + 0.85 * place * place));
    const x = f / fs;
    const [cRe, cIm] = relativeCompliance(choice.suspension, local, first, f, fs);
    const size = 1 / (x * (cRe * cRe + cIm * cIm));
    const yRe = 1 / qms - cIm * size;
    const yIm = x * (1 + load.mu) - cRe * size - load.alpha / x;
    const scale = re / qes / (yRe * yRe + yIm * yIm);
    frequencyHz[i] = f;
    magnitudeOhm[i] = Math.hypot(re + yRe * scale, yIm * scale);
    if ((magnitudeOhm[i] ?? 0) > (magnitudeOhm[top] ?? 0)) top = i;
  }
  const found = threePoint(frequencyHz, magnitudeOhm, re, top);
  return found && { fsHz: found.fsHz, qms: found.qms, qes: found.qes, qts: found.qts };
}

/** What is known of mass and volume while the definition's Mms and Vas are formed. */
export interface DefinitionLoad {
  readonly massKg: number | null; // the heaviest added mass
  readonly mmsKg: number | null; // of the fit
  readonly alpha: number | null;
  readonly volumeM3: number | null;
  readonly stiffnessTimesArea: number | null; // ρc²·Sd², N·Pa
}

/**
 * Figures by definition for a creeping suspension: Mms = m/((fs/fm)² − 1), Vas = ρc²Sd²/(ωs²Mms), or
 * Vas = Vb((fc/fs)² − 1) where there is a test box only. R. H. Small, J. Audio Eng. Soc. 20 (1972) (from memory).
 * Empty for a constant suspension: there they are the parameters themselves.
 */
export function definitionFigures(
  choice: ModelChoice,
  local: ArrayLike<number>,
  { massKg, mmsKg, alpha, volumeM3, stiffnessTimesArea }: DefinitionLoad,
): Record<string, number> {
  if (choice.suspension === 'constant') return {};
  const free = definitionValues(choice, local, { mu: 0, alpha: 0 });
  if (!free) return {};
  const { fsHz, qms, qes, qts } = free;
  const resonance = { fs: fsHz, Qms: qms, QmsTotal: qms, Qes: qes, Qts: qts };
  const omegaSquared = (2 * Math.PI * fsHz) ** 2;
  if (massKg !== null && mmsKg !== null) {
    const loaded = definitionValues(choice, local, { mu: massKg / mmsKg, alpha: 0 });
    const ratio = loaded ? (fsHz / loaded.fsHz) ** 2 - 1 : 0;
    if (!(ratio > 0)) return resonance;
    const mms = massKg / ratio;
    const known = { ...resonance, Mms: mms, Cms: 1 / (omegaSquared * mms) };
    return stiffnessTimesArea === null ? known : { ...known, Vas: stiffnessTimesArea / (omegaSquared * mms) };
  }
  if (alpha !== null && volumeM3 !== null) {
    const boxed = definitionValues(choice, local, { mu: 0, alpha });
    const ratio = boxed ? (boxed.fsHz / fsHz) ** 2 - 1 : 0;
    if (!(ratio > 0)) return resonance;
    const known = { ...resonance, Vas: volumeM3 * ratio };
    const cms = stiffnessTimesArea === null ? null : known.Vas / stiffnessTimesArea;
    return cms === null ? known : { ...known, Cms: cms, Mms: 1 / (omegaSquared * cms) };
  }
  return resonance;
}
