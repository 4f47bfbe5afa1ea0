import { type RandomSource, seededRandom } from '../../calculators/numerics/random.js';
import type { Item } from '../../shared/contracts/item.js';
import { AIR_STIFFNESS_PA, type Branch, type DemoBox, type DemoDriver, type DemoPart } from './circuits.js';

/** The invented mid-woofer as its maker prints it. */
export const PUBLISHED: Item['published'] = {
  Re: { value: 5.6, unit: 'Ω', tolerance: 0.05 },
  fs: { value: 46, unit: 'Hz', tolerance: 0.1 },
  Qms: { value: 5, unit: '1' },
  Qes: { value: 0.41, unit: '1' },
  Qts: { value: 0.38, unit: '1', tolerance: 0.1 },
  Vas: { value: 0.0165, unit: 'm³', tolerance: 0.15 },
  Sd: { value: 0.0133, unit: 'm²' },
};
export const PISTON_DIAMETER_M = 0.1301; // πd²/4 = 133 cm²

const TYPICAL: DemoDriver = {
  reOhm: 5.62,
  l1Henry: 0.22e-3,
  l2Henry: 0.55e-3,
  r2Ohm: 6.2,
  blTm: 8.45,
  mmsKg: 0.0182,
  cmsMPerN: 6.6e-4,
  rmsKgPerS: 1.02,
  sdM2: 0.0133,
};

/** Sixteen of one type, as they come off one line: each figure with the spread that is usual for it. */
export function lotOfSixteen(): DemoDriver[] {
  const random = seededRandom(1613);
  const lot = Array.from({ length: 16 }, () => oneOf(random));
  lot[8] = { ...lot[8]!, blTm: lot[8]!.blTm * 0.9 }; // MW-09: a weak magnet
  lot[13] = { ...lot[13]!, rmsKgPerS: lot[13]!.rmsKgPerS * 2.1 }; // MW-14: something rubs
  return lot;
}

function oneOf(random: RandomSource): DemoDriver {
  const spread = (value: number, share: number) => value * (1 + share * random.normal());
  return {
    ...TYPICAL,
    reOhm: spread(TYPICAL.reOhm, 0.007),
    l1Henry: spread(TYPICAL.l1Henry, 0.02),
    l2Henry: spread(TYPICAL.l2Henry, 0.02),
    blTm: spread(TYPICAL.blTm, 0.01),
    mmsKg: spread(TYPICAL.mmsKg, 0.01),
    cmsMPerN: spread(TYPICAL.cmsMPerN, 0.045),
    rmsKgPerS: spread(TYPICAL.rmsKgPerS, 0.06),
  };
}

const CABINET_M3 = 0.0172;

/** A port as an acoustic mass that tunes `vbM3` to `fbHz`, with losses of its own: QP = 60. */
function portFor(fbHz: number, vbM3: number): Branch {
  const omega = 2 * Math.PI * fbHz;
  const massKgPerM4 = AIR_STIFFNESS_PA / (omega * omega * vbM3);
  return { massKgPerM4, resistancePaSPerM3: (omega * massKgPerM4) / 60 };
}

/** Leaks as one acoustic resistance: QL = ωb·Cab·R. */
function leakFor(ql: number, fbHz: number, vbM3: number): number {
  return (ql * AIR_STIFFNESS_PA) / (2 * Math.PI * fbHz * vbM3);
}

/** A wall that gives way at `f0Hz`: its compliance is a small share of the air's. */
function panelFor(f0Hz: number, q: number, share: number): Branch {
  const omega = 2 * Math.PI * f0Hz;
  const complianceM3PerPa = (share * CABINET_M3) / AIR_STIFFNESS_PA;
  const massKgPerM4 = 1 / (omega * omega * complianceM3PerPa);
  return { massKgPerM4, resistancePaSPerM3: (omega * massKgPerM4) / q, complianceM3PerPa };
}

interface DemoCabinet {
  readonly name: string;
  readonly note: string;
  readonly driverNumber: number; // which of the sixteen sits in it
  readonly box: DemoBox;
}

/** Eight cabinets for four rooms: meant to be alike. */
export function eightCabinets(): DemoCabinet[] {
  const drivers = [1, 2, 4, 6, 7, 8, 10, 12];
  return drivers.map((driverNumber, i) => {
    const number = i + 1;
    const fbHz = number === 6 ? 52 : 43 + 0.25 * (i % 3); // cabinet 6: its port was cut too short
    const ql = number === 3 ? 1.9 : 8.5 - 0.3 * (i % 4); // cabinet 3: a seam is open
    return {
      name: `Cabinet ${number}`,
      note: `17.2 L net, driver MW-${String(driverNumber).padStart(2, '0')}. Meant to be tuned to 43 Hz.`,
      driverNumber,
      box: {
        vbM3: CABINET_M3,
        leakPaSPerM3: leakFor(ql, fbHz, CABINET_M3),
        opening: portFor(fbHz, CABINET_M3),
        panel: number === 5 ? panelFor(168, 28, 0.025) : undefined, // cabinet 5: the side without a brace
      },
    };
  });
}

const RADIATOR = { sdM2: 0.0214, mmsKg: 0.045, cmsMPerN: 9e-4, rmsKgPerS: 0.9 };
export const RADIATOR_STEPS_KG = [0, 0.02, 0.04, 0.06];

/** The box with a passive radiator that carries `addedKg` more. */
export function radiatorBox(addedKg: number): DemoBox {
  const square = RADIATOR.sdM2 ** 2;
  return {
    vbM3: 0.0205,
    leakPaSPerM3: leakFor(11, 45, 0.0205),
    opening: {
      massKgPerM4: (RADIATOR.mmsKg + addedKg) / square,
      resistancePaSPerM3: RADIATOR.rmsKgPerS / square,
      complianceM3PerPa: RADIATOR.cmsMPerN * square,
    },
  };
}

interface NamedPart {
  readonly name: string;
  readonly note: string;
  readonly part: DemoPart;
}
const capacitor = (cFarad: number, esrOhm: number, tanDelta: number): DemoPart => {
  return { kind: 'capacitor', cFarad, esrOhm, tanDelta };
};
const coil = (lHenry: number, dcrOhm: number, coreLoss = 0.002): DemoPart => {
  return { kind: 'coil', lHenry, dcrOhm, coreLoss };
};

/** The drawer that stood below a dripping window. */
export const DRAWER: readonly NamedPart[] = [
  { name: 'C 4.7 µF film, left tray', note: 'Marked 4.7 µF ± 5 %.', part: capacitor(4.74e-6, 0.012, 0.0006) },
  { name: 'C 4.7 µF film, right tray', note: 'Marked 4.7 µF ± 5 %.', part: capacitor(4.66e-6, 0.014, 0.0007) },
  { name: 'C 10 µF bipolar, dry', note: 'Marked 10 µF ± 10 %.', part: capacitor(10.3e-6, 0.11, 0.035) },
  {
    name: 'C 10 µF bipolar, damp',
    note: 'Marked 10 µF ± 10 %. Its sleeve is stained.',
    part: capacitor(8.1e-6, 1.9, 0.16),
  },
  { name: 'C 22 µF bipolar, damp', note: 'Marked 22 µF ± 10 %.', part: capacitor(18.6e-6, 0.95, 0.13) },
  { name: 'L 0.47 mH air', note: 'Marked 0.47 mH ± 3 %.', part: coil(0.472e-3, 0.31) },
  { name: 'L 1.0 mH air', note: 'Marked 1.0 mH ± 3 %.', part: coil(1.004e-3, 0.46) },
  { name: 'L 2.2 mH cored', note: 'Marked 2.2 mH ± 5 %. The varnish has lifted.', part: coil(2.41e-3, 0.33, 0.03) },
  { name: 'R 4.7 Ω wire', note: 'Marked 4R7, 5 %.', part: { kind: 'resistor', rOhm: 4.76, lHenry: 2.1e-6 } },
  { name: 'R 10 Ω wire', note: 'Marked 10R, 5 %.', part: { kind: 'resistor', rOhm: 9.93, lHenry: 3.4e-6 } },
  { name: 'Unmarked A', note: 'A film capacitor; its print is washed off.', part: capacitor(6.83e-6, 0.015, 0.0008) },
  { name: 'Unmarked B', note: 'A coil on a plastic former, no label.', part: coil(0.819e-3, 0.42) },
];
