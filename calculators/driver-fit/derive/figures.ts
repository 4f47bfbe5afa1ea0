import type { Figure } from '../../../shared/output.js';
import { figureList } from '../figure-list.js';
import type { Estimate } from './estimates.js';

/** What decides why a figure has no value or no uncertainty. */
export interface FigureCircumstances {
  readonly hasLoad: boolean; // an added mass, a test box or a given figure
  readonly hasArea: boolean;
  readonly hasBox: boolean;
  readonly highHz: number;
  readonly model: string;
}

const MOVING = new Set(['Mms', 'Cms', 'Rms', 'Bl']);
const NEEDS_VAS = new Set(['Vas', 'eta0', 'SPL1W', 'SPL2V83']);
const NEEDS_1K = new Set(['Le1k']);
const NEEDS_10K = new Set(['Le10k', 'Rcoil10k']);
const EXACT = new Set(['ratedZ', 'rmsResidual']);
const NOTHING = 1e-12; // relative: rounding of the arithmetic, not an uncertainty
const EXACT_NOTES: Readonly<Record<string, string>> = {
  ratedZ: 'A step function of Zmin: no uncertainty of its own.',
  rmsResidual: 'Describes this fit: no uncertainty of its own.',
};

/** Every declared figure, in their order; those of other models than the chosen one are left out. */
export function figuresOf(
  values: ReadonlyMap<string, Estimate | number | null>,
  circumstances: FigureCircumstances,
): Figure[] {
  return figureList.flatMap(({ id, unit }) => {
    const found = values.get(id);
    if (found === undefined) return [];
    if (found === null || (typeof found === 'number' ? !Number.isFinite(found) : !Number.isFinite(found.value))) {
      return [{ id, unit, value: null, note: missingNote(id, circumstances) }];
    }
    if (typeof found === 'number') return [{ id, unit, value: found, note: EXACT_NOTES[id] ?? '' }];
    return [withUncertainty(id, unit, found)];
  });
}

function withUncertainty(id: string, unit: string, found: Estimate): Figure {
  const { value, uncertainty, interval, parts, spread, drift, noiseDof, kind } = found;
  const isExact = !(uncertainty > NOTHING * Math.abs(value));
  if (EXACT.has(id)) return { id, unit, value, note: EXACT_NOTES[id] ?? '' };
  if (!Number.isFinite(uncertainty) || (isExact && id !== 'fZmin')) {
    return { id, unit, value, note: exactNote(id) };
  }
  if (isExact) return { id, unit, value, note: 'At the end of the sweep: the curve still falls there.' };
  return {
    id,
    unit,
    value,
    uncertainty,
    ...degreesOf(uncertainty, Math.hypot(parts.noise, spread, drift), noiseDof),
    ...(interval ? { interval: { ...interval, coverage: 0.95, kind } } : {}),
  };
}

/** Welch–Satterthwaite (JCGM 100:2008, G.4): only the noise has finite degrees of freedom. */
function degreesOf(uncertainty: number, ofNoise: number, noiseDof: number): { dof?: number } {
  if (!(ofNoise > 0) || !(noiseDof > 0)) return {};
  const dof = noiseDof * (uncertainty / ofNoise) ** 4;
  return dof < 1e6 ? { dof } : {};
}

const exactNote = (id: string): string =>
  id === 'Sd' || id === 'Dd'
    ? 'Taken as exact: no uncertainty was given with it.'
    : 'No uncertainty: everything it follows from was taken as exact.';

function missingNote(id: string, { hasLoad, hasArea, hasBox, highHz, model }: FigureCircumstances): string {
  const load = 'Needs an added mass, a known volume, or one of Mms, Bl and Cms.';
  if (MOVING.has(id)) return hasLoad ? 'Needs the piston diameter as well.' : load;
  if (id === 'Mmd')
    return hasLoad && hasArea
      ? 'The air load of this piston is more than Mms: check the diameter.'
      : `${load} And the piston diameter.`;
  if (NEEDS_VAS.has(id)) return hasLoad ? 'Needs the piston diameter.' : `${load} And the piston diameter.`;
  if (id === 'Sd' || id === 'Dd') return 'The piston diameter was not given.';
  if (id === 'fc') return hasBox ? 'Not found in the test box’s sweep.' : 'Needs a sweep in a known volume.';
  if (NEEDS_1K.has(id)) return `The sweep does not reach 1 kHz; it ends at ${roundedHz(highHz)}.`;
  if (NEEDS_10K.has(id)) return `The sweep does not reach 10 kHz; it ends at ${roundedHz(highHz)}.`;
  if (id === 'ratedZ') return 'Zmin is below 80 % of 2 Ω.';
  if (id === 'fPeak' || id === 'Zmax') return 'The fitted curve has no peak near fs.';
  return `The data do not settle it in the model ${model}.`;
}

export const roundedHz = (frequencyHz: number): string =>
  frequencyHz >= 1000
    ? `${Number((frequencyHz / 1000).toPrecision(3))} kHz`
    : `${Number(frequencyHz.toPrecision(3))} Hz`;
