import { type AxisScale, pixelOf } from './axis-scale.js';

/** Where an axis is marked: labelled ticks in steps of 1-2-5, light ones at the others. */
export interface Tick {
  readonly value: number;
  readonly px: number;
  readonly label: string; // '' on a light tick
}
const LABELLED_MULTIPLES = [1, 2, 5];
const ANGLE_STEPS = [1, 2, 5, 10, 15, 30, 45, 90, 180, 360];
const ROUNDING = 1e-9; // a tick on the very edge of an axis belongs to it

export interface TickOptions {
  readonly labelGapPx: number; // least distance between two labelled ticks
  readonly labelWidthPx?: (label: string) => number; // of labels side by side: then the widths decide
  readonly isAngle?: boolean; // steps of 15, 30, 45, 90 rather than 10, 20, 50
  readonly locale?: string;
}

export function ticksOf(scale: AxisScale, options: TickOptions): Tick[] {
  const plan = scale.kind === 'log' ? logPlan(scale, options) : null;
  const { labelled, light } = plan ?? linearPlan(scale, options);
  const decimals = decimalsFor(labelled);
  const make = (value: number, label: string): Tick => ({ value, px: pixelOf(scale, value), label });
  const ticks = labelled.map((value) => make(value, tickLabel(value, decimals, options.locale)));
  return [...ticks, ...light.map((value) => make(value, ''))].sort((a, b) => a.value - b.value);
}

interface TickPlan {
  readonly labelled: number[];
  readonly light: number[];
}

/** Decades in 1-2-5; null where fewer than four of any kind of whole multiples are in view. */
function logPlan(scale: AxisScale, options: TickOptions): TickPlan | null {
  const gapPx = options.labelGapPx;
  const pxPerDecade = Math.abs(scale.slope) * Math.LN10;
  const multiples: number[] = [];
  const first = Math.floor(Math.log10(scale.min));
  const last = Math.ceil(Math.log10(scale.max));
  for (let decade = first; decade <= last; decade += 1) {
    for (let k = 1; k <= 9; k += 1) multiples.push(Number(`${k}e${decade}`));
  }
  const seen = multiples.filter((v) => v >= scale.min * (1 - ROUNDING) && v <= scale.max * (1 + ROUNDING));
  const leading = (v: number) => Number(v.toExponential()[0]);
  const oneTwoFive = seen.filter((v) => LABELLED_MULTIPLES.includes(leading(v)));
  if (seen.length < 4) return null;
  if (oneTwoFive.length < 4 && pxPerDecade * Math.log10(10 / 9) >= gapPx * 0.4) {
    const spaced = spacedOut(scale, seen, gapPx, oneTwoFive);
    return { labelled: spaced, light: seen.filter((v) => !spaced.includes(v)) };
  }
  const labelled = keepApart(scale, oneTwoFive, options) ? oneTwoFive : decadesOnly(seen, pxPerDecade, gapPx);
  return { labelled, light: pxPerDecade > 30 ? seen.filter((v) => !labelled.includes(v)) : [] };
}

const WORD_GAP_PX = 5;
/** Whether the labels of these values stand clear of each other. */
function keepApart(scale: AxisScale, values: readonly number[], options: TickOptions): boolean {
  const { labelWidthPx, labelGapPx, locale } = options;
  const decimals = decimalsFor(values);
  const width = (value: number) => labelWidthPx?.(tickLabel(value, decimals, locale)) ?? 0;
  return values.slice(1).every((value, i) => {
    const before = values[i] ?? value;
    const needed = labelWidthPx ? (width(before) + width(value)) / 2 + WORD_GAP_PX : labelGapPx;
    return Math.abs(pixelOf(scale, value) - pixelOf(scale, before)) >= needed;
  });
}

function decadesOnly(seen: readonly number[], pxPerDecade: number, gapPx: number): number[] {
  const every = Math.max(1, Math.ceil(gapPx / pxPerDecade));
  return seen.filter((v) => v.toExponential()[0] === '1' && Math.round(Math.log10(v)) % every === 0);
}

/** Takes the preferred ones first, then as many of the others as keep their distance. */
function spacedOut(scale: AxisScale, values: readonly number[], gapPx: number, preferred: readonly number[]): number[] {
  const taken: number[] = [];
  for (const value of [...preferred, ...values.filter((v) => !preferred.includes(v))]) {
    const px = pixelOf(scale, value);
    if (taken.every((other) => Math.abs(pixelOf(scale, other) - px) >= gapPx)) taken.push(value);
  }
  return taken.sort((a, b) => a - b);
}

/** Evenly spaced values; also on a logarithmic axis when it shows less than a whole multiple. */
function linearPlan(scale: AxisScale, { labelGapPx, isAngle }: TickOptions): TickPlan {
  const pxPerUnit = Math.abs(scale.slope) / (scale.kind === 'log' ? scale.max : 1); // where they lie closest
  const step = niceStep(labelGapPx / pxPerUnit, isAngle === true && scale.max - scale.min > 8);
  const labelled = multiplesOf(step, scale);
  const parts = isAngle && step >= 15 ? 3 : leadingDigit(step) === 2 ? 4 : 5;
  const light = multiplesOf(step / parts, scale).filter(
    (v) => Math.abs(v / step - Math.round(v / step)) > ROUNDING * 1e3,
  );
  return { labelled, light };
}
const leadingDigit = (v: number): number => Number(v.toExponential()[0]);

function multiplesOf(step: number, { min, max }: AxisScale): number[] {
  const values: number[] = [];
  const first = Math.ceil(min / step - ROUNDING * 1e3);
  const last = Math.floor(max / step + ROUNDING * 1e3);
  for (let k = first; k <= last && values.length < 500; k += 1)
    values.push(k === 0 ? 0 : Number((k * step).toPrecision(12)));
  return values;
}

function niceStep(least: number, isAngle: boolean): number {
  if (isAngle) {
    const step = ANGLE_STEPS.find((s) => s >= least);
    if (step) return step;
  }
  const decade = 10 ** Math.floor(Math.log10(least));
  const found = [1, 2, 5, 10].find((k) => k * decade >= least * (1 - ROUNDING)) ?? 10;
  return Number((found * decade).toPrecision(1));
}

/** Decimals that tell the labelled values apart, counted in the unit they are written in (1 or 1k). */
function decimalsFor(labelled: readonly number[]): (value: number) => number {
  let step = Number.POSITIVE_INFINITY;
  for (let i = 1; i < labelled.length; i += 1) step = Math.min(step, (labelled[i] ?? 0) - (labelled[i - 1] ?? 0));
  return (value) => {
    const unit = prefixOf(value).factor;
    const finest = Math.min(step, Math.abs(value) || step) / unit;
    return Number.isFinite(finest) && finest > 0 ? Math.min(9, Math.max(0, -Math.floor(Math.log10(finest) + 1e-9))) : 0;
  };
}

function prefixOf(value: number): { factor: number; sign: string } {
  const size = Math.abs(value);
  if (size >= 1e6) return { factor: 1e6, sign: 'M' };
  return size >= 1e3 ? { factor: 1e3, sign: 'k' } : { factor: 1, sign: '' };
}

function tickLabel(value: number, decimals: (value: number) => number, locale?: string): string {
  const { factor, sign } = prefixOf(value);
  const format = numberFormat(locale, decimals(value));
  return `${format
    .format(value / factor)
    .replace(/^-(?=[0.,]*$)/, '')
    .replace('-', '\u2212')}${sign}`;
}

const formats = new Map<string, Intl.NumberFormat>();
function numberFormat(locale: string | undefined, decimals: number): Intl.NumberFormat {
  const key = `${locale ?? ''}/${decimals}`;
  const known = formats.get(key);
  if (known) return known;
  const made = new Intl.NumberFormat(locale, { maximumFractionDigits: decimals, useGrouping: false });
  formats.set(key, made);
  return made;
}
