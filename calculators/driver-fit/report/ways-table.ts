import type { Table } from '../../../shared/output.js';
import type { MassWay } from '../derive/driver-numbers.js';
import type { Externals } from '../derive/externals.js';
import type { BandResult } from '../fitting/bands.js';
import type { SingleFit } from '../fitting/single-fit.js';

const WAY_NAMES: Readonly<Record<MassWay, string>> = {
  'added-mass': 'Joint fit, added mass',
  'known-volume': 'Joint fit, known volume',
  given: 'From the given figure',
};
interface Row {
  readonly way: string;
  readonly sweep: string;
  readonly Mms: number | null;
  readonly Cms: number | null;
  readonly Vas: number | null;
  readonly uncertainty: number | null;
}

/**
 * Mms, Cms and Vas by every way there is, the by-hand ones included: the subtraction of two peaks for each mass,
 * Mms = m/((fs/fm)² − 1); the line of 1/f² over m for several; the known volume with equal moving masses,
 * Vas = Vb((fc/fs)² − 1), and with unequal ones, Vas = Vb(fc·Qec/(fs·Qes) − 1).
 * Source: R. H. Small, J. Audio Eng. Soc. 20 (1972) (from memory). Null where there is neither mass, volume nor figure.
 */
export function waysTable({ analysis, models }: BandResult, externals: Externals): Table | null {
  const { singles } = analysis;
  const [free, ...loaded] = singles;
  const { mass, vas } = models[0].propagated;
  if (!free || mass.length + vas.length === 0) return null;
  const relations = relationsOf(free, externals);
  const joint = (Object.keys(WAY_NAMES) as MassWay[]).flatMap((way): Row[] => {
    const ofMass = mass.find((estimate) => estimate.way === way);
    const ofVas = vas.find((estimate) => estimate.way === way);
    if (!ofMass && !ofVas) return [];
    const cms = ofMass ? relations.complianceOf(ofMass.value) : null;
    const relative = ofVas ? ofVas.uncertainty / ofVas.value : ofMass ? ofMass.uncertainty / ofMass.value : null;
    return [
      {
        way: WAY_NAMES[way],
        sweep: '',
        Mms: ofMass?.value ?? null,
        Cms: cms,
        Vas: ofVas?.value ?? null,
        uncertainty: relative,
      },
    ];
  });
  const byHand = loaded.flatMap((single) => relations.byHand(single));
  const rows = [...joint, ...byHand, ...lineRow(free, loaded, relations)];
  return {
    id: 'ways',
    title: 'Moving mass and Vas by each way',
    columns: [
      { id: 'way', label: 'Way', kind: 'text' },
      { id: 'sweep', label: 'Sweep', kind: 'text' },
      { id: 'Mms', label: 'Mms', kind: 'number', unit: 'kg' },
      { id: 'Cms', label: 'Cms', kind: 'number', unit: 'm/N' },
      { id: 'Vas', label: 'Vas', kind: 'number', unit: 'm³' },
      { id: 'uncertainty', label: 'Relative uncertainty', kind: 'number', unit: '1' },
    ],
    rows: rows.map((row) => ({ ...row })),
  };
}

interface Relations {
  readonly complianceOf: (mmsKg: number) => number;
  readonly ofMass: (way: string, sweep: string, mmsKg: number) => Row[];
  readonly byHand: (single: SingleFit) => Row[];
}

function relationsOf(free: SingleFit, externals: Externals): Relations {
  const omega = 2 * Math.PI * free.fsHz;
  const { sdM2, densityKgPerM3, speedOfSoundMPerS } = externals;
  const stiffness = densityKgPerM3 * speedOfSoundMPerS ** 2;
  const squareArea = sdM2 === null ? null : stiffness * sdM2 * sdM2;
  const complianceOf = (mmsKg: number): number => 1 / (omega * omega * mmsKg);
  const ofMass = (way: string, sweep: string, mmsKg: number): Row[] => {
    if (!(mmsKg > 0) || !Number.isFinite(mmsKg)) return [];
    const cms = complianceOf(mmsKg);
    return [
      { way, sweep, Mms: mmsKg, Cms: cms, Vas: squareArea === null ? null : squareArea * cms, uncertainty: null },
    ];
  };
  const ofVolume = (way: string, sweep: string, vasM3: number): Row[] => {
    if (!(vasM3 > 0)) return [];
    const cms = squareArea === null ? null : vasM3 / squareArea;
    return [
      { way, sweep, Mms: cms === null ? null : 1 / (omega * omega * cms), Cms: cms, Vas: vasM3, uncertainty: null },
    ];
  };
  const byHand = (single: SingleFit): Row[] => {
    const { massKg, volumeM3, name } = single.measured;
    const squareRatio = (single.fsHz / free.fsHz) ** 2;
    if (volumeM3 === null) return ofMass('Two peaks subtracted', name, massKg / (1 / squareRatio - 1));
    const electrical = (single.fsHz * single.qes * free.reOhm) / (free.fsHz * free.qes * single.reOhm);
    return [
      ...ofVolume('Known volume, equal moving masses', name, volumeM3 * (squareRatio - 1)),
      ...ofVolume('Known volume, unequal moving masses', name, volumeM3 * (electrical - 1)),
    ];
  };
  return { complianceOf, ofMass, byHand };
}

/** Least squares of 1/f² = 4π²Cms(Mms + m) on m, all sweeps alike. */
function lineRow(free: SingleFit, loaded: readonly SingleFit[], { ofMass }: Relations): Row[] {
  const points = [free, ...loaded.filter(({ measured }) => measured.volumeM3 === null)];
  if (points.length < 3) return [];
  const n = points.length;
  const m = points.map(({ measured }) => measured.massKg);
  const y = points.map(({ fsHz }) => 1 / (fsHz * fsHz));
  const meanM = m.reduce((a, b) => a + b, 0) / n;
  const meanY = y.reduce((a, b) => a + b, 0) / n;
  const slope =
    m.reduce((sum, x, i) => sum + (x - meanM) * ((y[i] ?? 0) - meanY), 0) /
    m.reduce((sum, x) => sum + (x - meanM) ** 2, 0);
  return ofMass('Line through all masses', '', (meanY - slope * meanM) / slope);
}
