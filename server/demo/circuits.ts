import { airOf, bulkModulusPa } from '../../calculators/acoustics/air.js';
import { add, type Complex, inverse, multiply, parallel, real } from './complex.js';

/**
 * The circuits behind the demo's invented sweeps. Relations of R. H. Small, "Direct-Radiator Loudspeaker System
 * Analysis", J. Audio Eng. Soc. 20 (1972), "Vented-Box Loudspeaker Systems", JAES 21 (1973) and "Passive-Radiator
 * Loudspeaker Systems", JAES 22 (1974), from memory; the coil as an inductor beside an eddy branch. SI units.
 */
export const AIR_STIFFNESS_PA = bulkModulusPa(airOf()); // ρc² at 20 °C

export interface DemoDriver {
  readonly reOhm: number;
  readonly l1Henry: number;
  readonly l2Henry: number;
  readonly r2Ohm: number;
  readonly blTm: number;
  readonly mmsKg: number;
  readonly cmsMPerN: number;
  readonly rmsKgPerS: number;
  readonly sdM2: number;
}
export interface DemoBox {
  readonly vbM3: number;
  readonly leakPaSPerM3: number; // acoustic resistance of all leaks
  readonly opening?: Branch | undefined; // port or passive radiator, seen from inside
  readonly panel?: Branch | undefined; // a wall that resonates
}
/** Acoustic mass, resistance and, where there is a suspension or a wall's stiffness, compliance, in series. */
export interface Branch {
  readonly massKgPerM4: number;
  readonly resistancePaSPerM3: number;
  readonly complianceM3PerPa?: number | undefined;
}

const inductor = (omega: number, henry: number): Complex => ({ re: 0, im: omega * henry });
const capacitor = (omega: number, farad: number): Complex => ({ re: 0, im: -1 / (omega * farad) });

function branchImpedance(branch: Branch, omega: number): Complex {
  const { massKgPerM4, resistancePaSPerM3, complianceM3PerPa } = branch;
  const series = add(real(resistancePaSPerM3), inductor(omega, massKgPerM4));
  return complianceM3PerPa === undefined ? series : add(series, capacitor(omega, complianceM3PerPa));
}

/** What the cone sees behind it, in Pa·s/m³: the box's compliance, its leaks, its opening and its walls side by side. */
export function boxImpedance(box: DemoBox, omega: number): Complex {
  const branches = [capacitor(omega, box.vbM3 / AIR_STIFFNESS_PA), real(box.leakPaSPerM3)];
  for (const branch of [box.opening, box.panel]) if (branch) branches.push(branchImpedance(branch, omega));
  return parallel(...branches);
}

/** Terminal impedance in ohm at one frequency, in free air or in a box, with a mass stuck to the cone or without. */
export function driverImpedance(driver: DemoDriver, frequencyHz: number, box?: DemoBox, addedMassKg = 0): Complex {
  const omega = 2 * Math.PI * frequencyHz;
  const mechanical = [
    real(driver.rmsKgPerS),
    inductor(omega, driver.mmsKg + addedMassKg),
    capacitor(omega, driver.cmsMPerN),
  ];
  if (box) mechanical.push(multiply(real(driver.sdM2 ** 2), boxImpedance(box, omega)));
  const motional = multiply(real(driver.blTm ** 2), inverse(add(...mechanical)));
  const eddy = parallel(inductor(omega, driver.l2Henry), real(driver.r2Ohm));
  return add(real(driver.reOhm), inductor(omega, driver.l1Henry), eddy, motional);
}

export type DemoPart =
  | { readonly kind: 'resistor'; readonly rOhm: number; readonly lHenry: number }
  | { readonly kind: 'capacitor'; readonly cFarad: number; readonly esrOhm: number; readonly tanDelta: number }
  | { readonly kind: 'coil'; readonly lHenry: number; readonly dcrOhm: number; readonly coreLoss: number };

/** Impedance of a crossover part in ohm; `coreLoss` is the share of ωL at 1 kHz that is lost, rising with frequency. */
export function partImpedance(part: DemoPart, frequencyHz: number): Complex {
  const omega = 2 * Math.PI * frequencyHz;
  switch (part.kind) {
    case 'resistor':
      return add(real(part.rOhm), inductor(omega, part.lHenry));
    case 'capacitor':
      return add(real(part.esrOhm + part.tanDelta / (omega * part.cFarad)), capacitor(omega, part.cFarad));
    case 'coil':
      return add(
        real(part.dcrOhm + part.coreLoss * omega * part.lHenry * Math.sqrt(frequencyHz / 1000)),
        inductor(omega, part.lHenry),
      );
  }
}
