import { randomUUID } from 'node:crypto';
import { type CreateSheet, CreateSheetSchema } from '../../shared/contracts/sheet.js';
import type { SweepRow } from '../../shared/contracts/sweep.js';
import { ADDED_MASS_KG, TEST_VOLUME_M3 } from './demo-sweeps.js';
import { PISTON_DIAMETER_M, RADIATOR_STEPS_KG } from './lot.js';

type Sweeps = ReadonlyMap<string, SweepRow>;

/** The sheets that the school keeps: two with a driver fit, and one for each of the other jobs. */
export function demoSheets(sweeps: Sweeps): CreateSheet[] {
  const lotNames = Array.from({ length: 8 }, (_, i) => `MW-${String(i + 1).padStart(2, '0')} free air`);
  const cabinetNames = Array.from({ length: 8 }, (_, i) => `Cabinet ${i + 1}`);
  const stepNames = RADIATOR_STEPS_KG.map((kg) => `Radiator box, ${Math.round(kg * 1000)} g added`);
  return [
    fitSheet(sweeps, 'MW-03: parameters by added mass', 'MW-03 free air', 'added-mass', 'MW-03 with 10.2 g', {
      mass: ADDED_MASS_KG,
      massUncertainty: 0.00005,
    }),
    fitSheet(sweeps, 'MW-05: parameters by known volume', 'MW-05 free air', 'known-volume', 'MW-05 in 9.8 L', {
      volume: TEST_VOLUME_M3,
      volumeUncertainty: 0.0001,
    }),
    sheet(sweeps, 'The lot, first eight', lotNames, { frequencyRangeHz: [10, 500] }),
    sheet(sweeps, 'Cabinets side by side', cabinetNames, { frequencyRangeHz: [10, 500] }),
    sheet(sweeps, 'Radiator box, step by step', stepNames, { frequencyRangeHz: [10, 300] }),
    sheet(sweeps, 'Two 10 µF from the drawer', ['C 10 µF bipolar, dry', 'C 10 µF bipolar, damp'], {}),
  ];
}

function sheet(sweeps: Sweeps, name: string, drawnNames: readonly string[], more: object): CreateSheet {
  const drawn = drawnNames.map((sweepName, i) => {
    const lineNumber = (i % 8) + 1;
    return { sweepId: idOf(sweeps, sweepName), lineNumber, isReference: i === 0 };
  });
  return CreateSheetSchema.parse({ name, content: { drawn, ...more } });
}

function fitSheet(
  sweeps: Sweeps,
  name: string,
  freeAir: string,
  role: 'added-mass' | 'known-volume',
  other: string,
  keys: Record<string, number>,
): CreateSheet {
  const card = {
    id: randomUUID(),
    calculatorId: 'driver-fit',
    inputs: {
      'free-air': [{ sweepId: idOf(sweeps, freeAir), keys: {} }],
      [role]: [{ sweepId: idOf(sweeps, other), keys }],
    },
    settings: { pistonDiameter: PISTON_DIAMETER_M, pistonDiameterUncertainty: 0.001 },
  };
  return sheet(sweeps, name, [freeAir, other], { cards: [card] });
}

function idOf(sweeps: Sweeps, name: string): string {
  const found = sweeps.get(name);
  if (!found) throw new Error(`the demo has no sweep named ${name}`);
  return found.id;
}
