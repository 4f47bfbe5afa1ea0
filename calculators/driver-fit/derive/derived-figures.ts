import { type Extreme, extremeNear, extremeOf } from './extremes.js';

/** Everything from which the figures of a driver follow, in SI. Null: not known from what was given. */
export interface DriverNumbers {
  readonly reOhm: number;
  readonly fsHz: number;
  readonly qms: number;
  readonly qes: number;
  readonly qmsTotal: number;
  readonly mmsKg: number | null;
  readonly vasM3: number | null;
  readonly sdM2: number | null;
  readonly fcHz: number | null;
  readonly densityKgPerM3: number;
  readonly speedOfSoundMPerS: number;
  readonly coilOhm: (frequencyHz: number) => { readonly re: number; readonly im: number };
  readonly squaredOhm: (lnF: number) => number; // |Z|² of the fitted curve
  readonly definition: Readonly<Record<string, number>>; // by the three-point method on the fitted motional impedance
  readonly parameters: Readonly<Record<string, number | null>>; // of coil and suspension, by the id of their figure
}
export interface FigureContext {
  readonly airLoadDiscs: 1 | 2; // (8/3)ρa³ times this is the air load of the mounting
  readonly lowHz: number; // ends of the sweep
  readonly highHz: number;
}
export interface CurveExtremes {
  readonly peak: Extreme;
  readonly least: Extreme;
}
export type FigureValues = Record<string, number | null>;

/** Marks the value of a figure by the three-point definition, beside that of the model's parameter. */
export const BY_DEFINITION = ':definition';

const REFERENCE_PRESSURE_PA = 20e-6;
const RATED_OHM = [2, 3, 4, 6, 8, 12, 16] as const;
const USUAL_LEVEL_SQUARED = 8; // (2.83 V)² = 1 W into 8 Ω

export function extremesOf(numbers: DriverNumbers, { highHz, lowHz }: FigureContext): CurveExtremes {
  const lnFs = Math.log(numbers.fsHz);
  const peak = extremeOf(numbers.squaredOhm, lnFs - 0.5, lnFs + 0.5, 1);
  const from = Math.max(peak.lnF, Math.log(lowHz));
  return { peak, least: extremeOf(numbers.squaredOhm, from, Math.max(Math.log(highHz), from + 1e-3), -1) };
}

/**
 * Every figure but the misfit, from the numbers of one driver. Relations: R. H. Small, J. Audio Eng. Soc. 20 (1972)
 * 383 (from memory): Cms = 1/(ωs²Mms), Rms = ωsMms/Qms, Bl = √(ωsMmsRe/Qes), Res = ReQms/Qes,
 * η0 = (4π²/c³)·fs³Vas/Qes. Air load of a disc: L. L. Beranek, "Acoustics" (from memory). Rated impedance: the 80 %
 * rule of IEC 60268-5 (from memory). `before` are the extremes of the unchanged curve while derivatives are formed.
 */
export function figureValues(numbers: DriverNumbers, context: FigureContext, before?: CurveExtremes): FigureValues {
  const { peak, least } = before
    ? { peak: extremeNear(numbers.squaredOhm, before.peak), least: extremeNear(numbers.squaredOhm, before.least) }
    : extremesOf(numbers, context);
  const { reOhm, fsHz, qms, qes, qmsTotal } = numbers;
  return {
    Re: reOhm,
    fs: fsHz,
    Qms: qms,
    Qes: qes,
    Qts: (qms * qes) / (qms + qes),
    QmsTotal: qmsTotal,
    Res: (reOhm * qms) / qes,
    EBP: fsHz / qes,
    fPeak: peak.isInside ? Math.exp(peak.lnF) : null,
    Zmax: peak.isInside ? peak.ohm : null,
    Zmin: least.ohm,
    fZmin: Math.exp(least.lnF),
    ratedZ: RATED_OHM.findLast((rated) => least.ohm >= 0.8 * rated) ?? null,
    ...coilFigures(numbers, context),
    ...movingFigures(numbers, context),
    ...numbers.parameters,
    ...Object.fromEntries(Object.entries(numbers.definition).map(([id, value]) => [id + BY_DEFINITION, value])),
  };
}

function coilFigures({ coilOhm }: DriverNumbers, { highHz, lowHz }: FigureContext): FigureValues {
  const reaches = (f: number): boolean => f >= lowHz * 0.99 && f <= highHz * 1.01;
  const at1k = reaches(1000) ? coilOhm(1000) : null;
  const at10k = reaches(10_000) ? coilOhm(10_000) : null;
  return {
    Le1k: at1k && at1k.im / (2 * Math.PI * 1000),
    Le10k: at10k && at10k.im / (2 * Math.PI * 10_000),
    Rcoil10k: at10k?.re ?? null,
  };
}

function movingFigures(numbers: DriverNumbers, { airLoadDiscs }: FigureContext): FigureValues {
  const { reOhm, fsHz, qms, qes, mmsKg, vasM3, sdM2, fcHz, densityKgPerM3: rho, speedOfSoundMPerS: c } = numbers;
  const omega = 2 * Math.PI * fsHz;
  const radius = sdM2 === null ? null : Math.sqrt(sdM2 / Math.PI);
  const airLoad = radius === null ? null : airLoadDiscs * (8 / 3) * rho * radius ** 3;
  const eta0 = vasM3 === null ? null : (4 * Math.PI ** 2 * fsHz ** 3 * vasM3) / (c ** 3 * qes);
  const spl1W =
    eta0 === null ? null : 10 * Math.log10((eta0 * rho * c) / (2 * Math.PI)) - 20 * Math.log10(REFERENCE_PRESSURE_PA);
  return {
    Mms: mmsKg,
    Mmd: mmsKg !== null && airLoad !== null && mmsKg > airLoad ? mmsKg - airLoad : null,
    Cms: mmsKg === null ? null : 1 / (omega * omega * mmsKg),
    Rms: mmsKg === null ? null : (omega * mmsKg) / qms,
    Bl: mmsKg === null ? null : Math.sqrt((omega * mmsKg * reOhm) / qes),
    Vas: vasM3,
    Sd: sdM2,
    Dd: radius === null ? null : 2 * radius,
    fc: fcHz,
    eta0,
    SPL1W: spl1W,
    SPL2V83: spl1W === null ? null : spl1W + 10 * Math.log10(USUAL_LEVEL_SQUARED / reOhm),
  };
}
