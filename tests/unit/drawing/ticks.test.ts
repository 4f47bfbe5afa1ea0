import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { axisScale, pixelOf, valueAt } from '../../../shared/drawing/scales/axis-scale.js';
import { ticksOf } from '../../../shared/drawing/scales/ticks.js';

const labels = (ticks: ReturnType<typeof ticksOf>) => ticks.filter((t) => t.label).map((t) => t.label);
const log = (min: number, max: number, px = 1000) => axisScale('log', [min, max], 0, px);
const linear = (min: number, max: number, px = 600) => axisScale('linear', [min, max], px, 0);
const gap = { labelGapPx: 30, locale: 'en' };

describe('ticks', () => {
  it('label 1, 2 and 5 of every decade on a logarithmic axis, in k from 1000 on', () => {
    expect(labels(ticksOf(log(10, 20_000), gap))).toEqual([
      '10',
      '20',
      '50',
      '100',
      '200',
      '500',
      '1k',
      '2k',
      '5k',
      '10k',
      '20k',
    ]);
  });
  it('put light lines at 3, 4, 6, 7, 8 and 9', () => {
    const light = ticksOf(log(100, 1000), { ...gap, labelGapPx: 120 }).filter((t) => !t.label);
    expect(light.map((t) => t.value)).toEqual([300, 400, 600, 700, 800, 900]);
  });
  it('label decades only where 1-2-5 would run together', () => {
    expect(labels(ticksOf(log(1, 1e6, 300), gap))).toEqual(['1', '10', '100', '1k', '10k', '100k', '1M']);
  });
  it('let the width of the words decide where it is told', () => {
    const narrow = { ...gap, labelWidthPx: (label: string) => label.length * 6.6 };
    expect(labels(ticksOf(log(9.5, 21_000, 285), narrow))).toContain('50');
    expect(labels(ticksOf(log(9.5, 21_000, 200), narrow))).toEqual(['10', '100', '1k', '10k']);
  });
  it('label other whole multiples when fewer than four of 1-2-5 are in view', () => {
    expect(labels(ticksOf(log(25, 80), gap))).toEqual(['30', '40', '50', '60', '70', '80']);
  });
  it('go on evenly when a logarithmic axis shows less than a few multiples', () => {
    expect(labels(ticksOf(log(31, 33), { ...gap, labelGapPx: 200 }))).toEqual(['31', '31.5', '32', '32.5', '33']);
  });
  it('divide angles by 45 or 30, not by 50 or 20', () => {
    expect(labels(ticksOf(linear(-90, 90, 150), { ...gap, isAngle: true }))).toEqual(['−90', '−45', '0', '45', '90']);
    expect(labels(ticksOf(linear(-90, 90, 400), { ...gap, labelGapPx: 50, isAngle: true }))).toEqual([
      '−90',
      '−60',
      '−30',
      '0',
      '30',
      '60',
      '90',
    ]);
  });
  it('write small values with the decimals they need, in the mark of the locale', () => {
    expect(labels(ticksOf(linear(0, 1), { labelGapPx: 120, locale: 'de' }))).toEqual([
      '0',
      '0,2',
      '0,4',
      '0,6',
      '0,8',
      '1',
    ]);
    expect(labels(ticksOf(linear(1200, 1300), { labelGapPx: 120, locale: 'en' }))).toEqual([
      '1.2k',
      '1.22k',
      '1.24k',
      '1.26k',
      '1.28k',
      '1.3k',
    ]);
  });

  const range = fc
    .tuple(fc.double({ min: 1e-3, max: 1e7, noNaN: true }), fc.double({ min: 1.001, max: 1e5, noNaN: true }))
    .map(([low, ratio]): [number, number] => [low, low * ratio]);
  it('stay inside the axis, keep their distance, and no two labels are the same', () => {
    fc.assert(
      fc.property(range, fc.constantFrom('log' as const, 'linear' as const), (limits, kind) => {
        const scale = axisScale(kind, limits, 40, 940);
        const labelled = ticksOf(scale, gap).filter((t) => t.label);
        expect(new Set(labelled.map((t) => t.label)).size).toBe(labelled.length);
        for (const [i, tick] of labelled.entries()) {
          expect(tick.px).toBeGreaterThanOrEqual(39.99);
          expect(tick.px).toBeLessThanOrEqual(940.01);
          const before = labelled[i - 1];
          if (before) expect(tick.px - before.px).toBeGreaterThanOrEqual(gap.labelGapPx * (1 - 1e-6));
        }
        expect(labelled.length).toBeGreaterThan(0);
      }),
      { numRuns: 400 },
    );
  });
});

describe('an axis', () => {
  it('turns a pixel back into the value it stands for', () => {
    const limits = fc.tuple(
      fc.double({ min: 1e-2, max: 1e4, noNaN: true }),
      fc.double({ min: 1.01, max: 1e4, noNaN: true }),
    );
    fc.assert(
      fc.property(limits, fc.double({ min: 0, max: 1, noNaN: true }), fc.boolean(), ([low, ratio], part, isLog) => {
        const scale = axisScale(isLog ? 'log' : 'linear', [low, low * ratio], 60, 860);
        const px = 60 + part * 800;
        expect(pixelOf(scale, valueAt(scale, px))).toBeCloseTo(px, 6);
      }),
    );
  });
  it('puts its limits on its ends', () => {
    const scale = log(20, 20_000);
    expect([pixelOf(scale, 20), pixelOf(scale, 20_000)].map((px) => Math.round(px * 1e9) / 1e9)).toEqual([0, 1000]);
  });
});
