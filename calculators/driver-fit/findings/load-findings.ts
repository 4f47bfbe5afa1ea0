import type { Finding } from '../../../shared/output.js';
import type { Externals } from '../derive/externals.js';
import type { Propagated } from '../derive/propagation.js';
import type { Analysis } from '../fitting/analysis.js';
import { valuesById } from '../fitting/joint-fit.js';
import { LEAKY_BELOW, LEAST_MASS_CHANGE, RE_LIMIT } from '../fitting/load-checks.js';
import type { SingleFit } from '../fitting/single-fit.js';
import type { Measured } from '../measured.js';
import type { DriverFitSettings } from '../settings.js';
import { finding, grams, hertz, listed, litres, ohms, percent } from './finding.js';

const SMALL_SHIFT = 0.1; // common practice: under 10 % the noise of fs rules the result
const LARGE_SHIFT = 0.5; // common practice: beyond 50 % the suspension is no longer the same

/** What the sweeps under load say about each other. `measured` is as declared, the analysis as righted. */
export function loadFindings(
  measured: readonly Measured[],
  analysis: Analysis,
  propagated: Propagated,
  settings: DriverFitSettings,
): Finding[] {
  return [
    ...seriesFindings(measured, analysis),
    ...shiftFindings(analysis.singles),
    ...resistanceFindings(analysis, settings),
    ...boxFindings(analysis, propagated),
  ];
}

function seriesFindings(measured: readonly Measured[], { verdict, singles }: Analysis): Finding[] {
  const found: Finding[] = [];
  if (verdict.exchanged) {
    const [a, b] = verdict.exchanged.map((place) => measured[place]?.name ?? '');
    const message = `${a} and ${b} were taken for each other: the resonances only fit the other way round. They are exchanged for this fit. Exchange them where they were added.`;
    found.push(finding('sweeps-swapped', message, { evidence: { first: a ?? '', second: b ?? '' } }));
  }
  if (verdict.inconsistent.length > 0) {
    const names = verdict.inconsistent.map((place) => singles[place]?.measured.name ?? '');
    const message = verdict.isNamedSurely
      ? `${listed(names)} does not fit the other sweeps: its resonance is not where its mass puts it. It is left out. Weigh the mass again, and look whether it sat firmly.`
      : `${listed(names)} do not fit together with the free-air sweep, and there are too few to tell which is wrong. Weigh the masses again, and sweep again with one more mass.`;
    found.push(finding('mass-series-inconsistent', message, { evidence: { sweeps: names.join(', ') } }));
  }
  return found;
}

function shiftFindings(singles: readonly SingleFit[]): Finding[] {
  const [free] = singles;
  const masses = singles.filter(({ measured }) => measured.role === 'added-mass');
  const box = singles.find(({ measured }) => measured.role === 'known-volume');
  const found: Finding[] = [];
  if (!free) return found;
  const heaviest = masses.reduce<SingleFit | null>((a, b) => (a && a.fsHz < b.fsHz ? a : b), null);
  if (heaviest) {
    const shift = 1 - heaviest.fsHz / free.fsHz;
    const evidence = { shift, mass: heaviest.measured.massKg };
    const mass = grams(heaviest.measured.massKg);
    if (shift < SMALL_SHIFT) {
      const message = `${mass} lower the resonance by ${percent(Math.max(shift, 0))} only, from ${hertz(free.fsHz)} to ${hertz(heaviest.fsHz)}. 20 to 50 % is common practice: take a heavier mass for Mms and Vas.`;
      found.push(finding('added-mass-too-small', message, { frequency: heaviest.fsHz, evidence }));
    } else if (shift > LARGE_SHIFT) {
      const message = `${mass} lower the resonance by ${percent(shift)}, from ${hertz(free.fsHz)} to ${hertz(heaviest.fsHz)}. So heavy a mass makes the cone sag and the suspension stiffer: take a lighter one.`;
      found.push(finding('added-mass-too-large', message, { frequency: heaviest.fsHz, evidence }));
    }
  }
  if (box) {
    const shift = box.fsHz / free.fsHz - 1;
    if (shift < SMALL_SHIFT) {
      const volume = litres(box.measured.volumeM3 ?? 0);
      const message = `${volume} raise the resonance by ${percent(Math.max(shift, 0))} only, from ${hertz(free.fsHz)} to ${hertz(box.fsHz)}. Take a smaller test box for Vas.`;
      found.push(finding('test-volume-too-large', message, { frequency: box.fsHz, evidence: { shift } }));
    }
  }
  return found;
}

function resistanceFindings({ setup, outcomes, singles }: Analysis, { dcResistance }: DriverFitSettings): Finding[] {
  const [{ problem, fit }] = outcomes;
  const values = valuesById(problem, fit);
  const shared = values.Re ?? 1;
  const found = setup.sweeps.flatMap(({ measured }, i) => {
    const own = values[`Re${i + 1}`];
    if (!setup.shape.hasOwnRe[i] || own === undefined) return [];
    const ratio = own / shared;
    const message = `Re is ${ohms(own)} in ${measured.name} and ${ohms(shared)} in free air, ${percent(Math.abs(ratio - 1))} apart: a warm coil or a bad contact. Each sweep gets a resistance of its own here; let the coil cool, check the clips and sweep again.`;
    return [finding('re-mismatch', message, { evidence: { ratio } })];
  });
  const [free] = singles;
  if (dcResistance === undefined || !free) return found;
  const ratio = free.reOhm / dcResistance;
  if (Math.abs(ratio - 1) < Math.max(RE_LIMIT, 3 * free.relative.re)) return found;
  const message = `The sweep gives Re ${ohms(free.reOhm)}, the DC resistance told is ${ohms(dcResistance)}: ${percent(Math.abs(ratio - 1))} apart. Take the leads off the reading, and check the clips.`;
  return [...found, finding('re-mismatch', message, { evidence: { ratio } })];
}

function boxFindings({ setup, outcomes }: Analysis, propagated: Propagated): Finding[] {
  const [{ problem, fit }] = outcomes;
  const values = valuesById(problem, fit);
  const place = setup.sweeps.findIndex(({ measured }) => measured.role === 'known-volume') + 1;
  const name = setup.sweeps[place - 1]?.measured.name ?? '';
  const found: Finding[] = [];
  const leak = values[`QL${place}`];
  if (setup.shape.boxKind === 'leaky' && leak !== undefined && leak < LEAKY_BELOW) {
    const message = `The test box of ${name} leaks: its QL is ${Number(leak.toPrecision(2))}, sound ones reach 30 and more. The leak is in the fit; seal the box and the driver's rim, and sweep again.`;
    found.push(finding('test-box-leaky', message, { evidence: { QL: leak } }));
  }
  const change = values[`mu${place}`];
  if (setup.shape.isBoxMassFree && change !== undefined && Math.abs(change) > LEAST_MASS_CHANGE) {
    const message = `The moving mass in the test box is ${percent(Math.abs(change))} ${change > 0 ? 'more' : 'less'} than in free air. A few per cent are the box's air load; more means that something moved. Vas is taken without assuming equal masses.`;
    found.push(finding('moving-mass-changed', message, { evidence: { change } }));
  }
  return found.length > 0 ? found : wayFindings(propagated);
}

const WAYS_APART = 4; // standard deviations

/** Mms by added mass and by test box, where both are there. */
function wayFindings({ mass }: Propagated): Finding[] {
  const byMass = mass.find(({ way }) => way === 'added-mass');
  const byBox = mass.find(({ way }) => way === 'known-volume');
  if (!byMass || !byBox) return [];
  const apart = Math.log(byBox.value / byMass.value);
  const sure = Math.hypot(byMass.uncertainty / byMass.value, byBox.uncertainty / byBox.value);
  if (Math.abs(apart) < 0.05 || Math.abs(apart) < WAYS_APART * sure) return [];
  const message = `Mms is ${grams(byMass.value)} by added mass and ${grams(byBox.value)} by the test box. Check the piston diameter, the net volume and the mass.`;
  return [finding('moving-mass-changed', message, { evidence: { byMass: byMass.value, byBox: byBox.value } })];
}

/** A mass, a box or a given figure wants a piston diameter that nobody told. */
export function diameterFindings({ mass, vas, values }: Propagated, { sdM2 }: Externals): Finding[] {
  const isWanted = mass.length + vas.length > 0 && (values.Vas === null || values.Mms === null);
  if (sdM2 !== null || !isWanted) return [];
  const what = values.Vas === null ? 'Vas, Mmd, efficiency and level need' : 'Mms, Cms, Rms and Bl need';
  const message = `${what} the piston diameter: measure from the middle of the surround on one side to the middle on the other.`;
  return [finding('diameter-missing', message)];
}
