import type { CreateItem } from '../../shared/contracts/item.js';
import type { SweepConditions } from '../../shared/contracts/sweep.js';
import { driverImpedance, partImpedance } from './circuits.js';
import { DRAWER, eightCabinets, lotOfSixteen, PUBLISHED, RADIATOR_STEPS_KG, radiatorBox } from './lot.js';
import { jigFile, laptopFile, logGrid, traceOf } from './sweep-files.js';

/** One sweep of the demo: the thing, how it was held, and the file as it came off the bench. */
export interface DemoSweep {
  readonly item: Pick<CreateItem, 'kind' | 'name' | 'note'> & Partial<CreateItem>;
  readonly name: string;
  readonly group: string;
  readonly conditions: SweepConditions;
  readonly tags: readonly string[];
  readonly fileName: string;
  readonly content: string;
}

export const ADDED_MASS_KG = 0.0102;
export const TEST_VOLUME_M3 = 0.0098;
const WITH_MASS = [3, 7, 11];
const IN_TEST_BOX = [5];
const LEVEL = { levelV: 0.2, temperatureK: 294 } as const;

const driverGrid = logGrid(10, 20_000, 400);
const boxGrid = logGrid(10, 20_000, 600);
const partGrid = logGrid(20, 20_000, 240);
const lot = lotOfSixteen();
const label = (number: number) => `MW-${String(number).padStart(2, '0')}`;
const driverItem = (number: number): DemoSweep['item'] => {
  const note = 'Mid-woofer, 165 mm, one lot of sixteen for the rehearsal rooms.';
  return { kind: 'driver', name: label(number), serial: `0417-${100 + number}`, note, published: PUBLISHED };
};

function freeAir(): DemoSweep[] {
  return lot.map((driver, i) => {
    const name = label(i + 1);
    const trace = traceOf((f) => driverImpedance(driver, f), driverGrid, 100 + i);
    return {
      item: driverItem(i + 1),
      name: `${name} free air`,
      group: 'Lot of sixteen',
      conditions: { role: 'free-air', ...LEVEL },
      tags: ['lot'],
      fileName: `${name.toLowerCase()}-free-air.csv`,
      content: jigFile(trace, `${name}, free air, clamped by the magnet, 0.2 V`),
    };
  });
}

function withMass(): DemoSweep[] {
  return WITH_MASS.map((number) => {
    const name = label(number);
    const trace = traceOf(
      (f) => driverImpedance(lot[number - 1]!, f, undefined, ADDED_MASS_KG),
      driverGrid,
      200 + number,
    );
    return {
      item: driverItem(number),
      name: `${name} with 10.2 g`,
      group: 'Added mass',
      conditions: { role: 'added-mass', addedMassKg: ADDED_MASS_KG, ...LEVEL },
      tags: [],
      fileName: `${name.toLowerCase()}-10g2.csv`,
      content: jigFile(trace, `${name}, 10.2 g of putty around the dust cap, weighed`),
    };
  });
}

function inTestBox(): DemoSweep[] {
  return IN_TEST_BOX.map((number) => {
    const name = label(number);
    const box = { vbM3: TEST_VOLUME_M3, leakPaSPerM3: 1e9 };
    const trace = traceOf((f) => driverImpedance(lot[number - 1]!, f, box), driverGrid, 300 + number);
    return {
      item: driverItem(number),
      name: `${name} in 9.8 L`,
      group: 'Known volume',
      conditions: { role: 'known-volume', testVolumeM3: TEST_VOLUME_M3, ...LEVEL },
      tags: [],
      fileName: `${name.toLowerCase()}-test-box.csv`,
      content: jigFile(trace, `${name} on the test box, 9.8 L net, sealed with putty`),
    };
  });
}

function cabinets(): DemoSweep[] {
  return eightCabinets().map(({ name, note, driverNumber, box }, i) => {
    const trace = traceOf((f) => driverImpedance(lot[driverNumber - 1]!, f, box), boxGrid, 400 + i);
    return {
      item: { kind: 'box', name, note },
      name,
      group: 'Cabinets',
      conditions: { role: 'box', ...LEVEL },
      tags: ['as built'],
      fileName: `${name.toLowerCase().replace(' ', '-')}.csv`,
      content: jigFile(trace, `${name} as built, port open, ${label(driverNumber)} inside`),
    };
  });
}

function radiatorSteps(): DemoSweep[] {
  return RADIATOR_STEPS_KG.map((addedKg, i) => {
    const grams = Math.round(addedKg * 1000);
    const trace = traceOf((f) => driverImpedance(lot[15]!, f, radiatorBox(addedKg)), boxGrid, 500 + i);
    return {
      item: {
        kind: 'box',
        name: 'Radiator box',
        note: '20.5 L net, driver MW-16, one passive radiator. Wanted: 40 Hz.',
      },
      name: `Radiator box, ${grams} g added`,
      group: 'Radiator box',
      conditions: { role: 'box', radiatorMassKg: addedKg, ...LEVEL },
      tags: [],
      fileName: `radiator-${grams}g.txt`,
      content: laptopFile(trace, `radiator box, ${grams} g on the radiator`),
    };
  });
}

function drawer(): DemoSweep[] {
  return DRAWER.map(({ name, note, part }, i) => ({
    item: { kind: 'part', name, note },
    name,
    group: 'Crossover drawer',
    conditions: { role: 'part', levelV: 1 },
    tags: [],
    fileName: `drawer-${String(i + 1).padStart(2, '0')}.txt`,
    content: laptopFile(
      traceOf((f) => partImpedance(part, f), partGrid, 600 + i),
      `drawer, part ${i + 1}`,
    ),
  }));
}

/** Everything that lies on the school's bench, in the order it was measured. */
export function demoSweeps(): DemoSweep[] {
  return [...freeAir(), ...withMass(), ...inTestBox(), ...cabinets(), ...radiatorSteps(), ...drawer()];
}
