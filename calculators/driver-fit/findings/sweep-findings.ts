import type { Finding } from '../../../shared/output.js';
import type { SingleFit } from '../fitting/single-fit.js';
import type { Measured } from '../measured.js';
import { finding, hertz, listed } from './finding.js';

const BOX_PROMINENCE = 0.25; // nepers of a second resonance: no fit of a single one could mean anything

/** Whether a sweep can be fitted at all. */
export const isUsable = ({ kind }: Measured): boolean =>
  kind.kind === 'driver' && kind.others.every(({ prominence }) => prominence < BOX_PROMINENCE);

/** What the curve of each sweep says before anything is fitted. */
export function curveFindings(measured: readonly Measured[]): Finding[] {
  return measured.flatMap((sweep) => [...kindFindings(sweep), ...phaseFindings(sweep)]);
}

function kindFindings({ kind, name, role, data }: Measured): Finding[] {
  const { frequencyHz } = data.grid;
  const low = hertz(frequencyHz[0] ?? 0);
  const high = hertz(frequencyHz.at(-1) ?? 0);
  if (kind.kind === 'not-a-driver') {
    const message = `${name} has no resonance between ${low} and ${high}: this looks like a part or a network. Check which sweep it is and whether the leads were on the driver.`;
    return [finding('not-a-driver', message)];
  }
  if (kind.kind === 'peak-outside-sweep') {
    const end = kind.side === 'below' ? `below ${low}` : `above ${high}`;
    const message = `The resonance of ${name} lies ${end}, outside the sweep. Sweep again from about a third to three times the resonance at least.`;
    return [finding('peak-outside-sweep', message)];
  }
  if (kind.kind === 'phase-sign-flipped') {
    const message = `The phase of ${name} runs the wrong way: capacitive below the resonance at ${hertz(kind.main.frequencyHz)}, inductive above it. Read the file again with its phase sign turned.`;
    return [finding('phase-sign-flipped', message, { frequency: kind.main.frequencyHz })];
  }
  const [second] = kind.others;
  if (!second) return [];
  const where = listed([kind.main, ...kind.others].map(({ frequencyHz: f }) => hertz(f)).sort());
  const cause =
    role === 'known-volume'
      ? 'A closed test box gives one: look for an open port or a large leak.'
      : 'A driver by itself gives one: it seems to sit in a box, or something rings with it.';
  const evidence = { main: kind.main.frequencyHz, second: second.frequencyHz };
  return [
    finding('two-resonances', `${name} has resonances at ${where}. ${cause} Take it out and sweep again.`, {
      frequency: second.frequencyHz,
      evidence,
    }),
  ];
}

function phaseFindings({ name, data }: Measured): Finding[] {
  if (data.hasPhase) return [];
  const message = `${name} has no phase: only |Z| is fitted, so coil and resonance are told apart less well. Export the phase too if you can.`;
  return [finding('no-phase', message)];
}

/** Hum and wild points that were left out of the fit of each sweep. */
export function wildFindings(singles: readonly SingleFit[]): Finding[] {
  return singles.flatMap(({ measured, wild }) => {
    const { frequencyHz } = measured.data.grid;
    const found: Finding[] = [];
    if (wild.mainsHz !== null) {
      const message = `${measured.name} shows mains hum at ${listed(wild.humHz.map(hertz))}; ${countOf(wild.humRows.length)} not fitted. Move the leads away from transformers and dimmers if it matters.`;
      const frequency = wild.humHz[0];
      const evidence = { mains: wild.mainsHz, points: wild.humRows.length };
      found.push(finding('mains-hum', message, { ...(frequency ? { frequency } : {}), evidence }));
    }
    const [first] = wild.wildRows;
    if (first !== undefined) {
      const places = wild.wildRows.slice(0, 4).map((row) => hertz(frequencyHz[row] ?? 0));
      const message = `${measured.name}: ${countOf(wild.wildRows.length)} far off the curve and not fitted, at ${listed(places)}${wild.wildRows.length > 4 ? ' and elsewhere' : ''}.`;
      const evidence = { points: wild.wildRows.length };
      found.push(finding('outlier-points', message, { frequency: frequencyHz[first] ?? 0, evidence }));
    }
    return found;
  });
}

const countOf = (points: number): string => (points === 1 ? '1 point is' : `${points} points are`);
