import { describe, expect, it } from 'vitest';
import { allLayers, chartSentence, chartSvg, drawChart } from '../../../shared/drawing/chart.js';
import { type ChartInput, FITTED_CHART } from '../../../shared/drawing/chart-input.js';
import { DARK_THEME, LIGHT_THEME, lineStyle, rampColor } from '../../../shared/drawing/palette.js';
import type { Primitive } from '../../../shared/drawing/primitives.js';
import { pixelOf, valueAt } from '../../../shared/drawing/scales/axis-scale.js';
import { someSweeps } from '../../e2e/chart-page/curves.js';

const input = (change: Partial<ChartInput> = {}): ChartInput => ({
  sweeps: someSweeps(2, 600),
  state: FITTED_CHART,
  widthPx: 1000,
  heightPx: 600,
  theme: LIGHT_THEME,
  locale: 'en',
  title: 'Rehearsal room 2',
  revision: 'Revision 3',
  ...change,
});
const flat = (items: readonly Primitive[]): Primitive[] =>
  items.flatMap((item) => (item.kind === 'clip' ? flat(item.items) : [item]));
const words = (of: ChartInput): string[] =>
  flat(allLayers(drawChart(of))).flatMap((item) => (item.kind === 'text' ? [item.text] : []));

describe('the picture of a chart', () => {
  it('names the unit once, in the title of each axis', () => {
    const shown = words(input());
    expect(shown.filter((word) => word.includes('Hz'))).toEqual(['Frequency, Hz']);
    expect(shown.filter((word) => word.includes('Ω'))).toEqual(['Impedance |Z|, Ω']);
    expect(shown).toContain('Phase, °');
  });
  it('holds title, revision and legend, so that an export carries them', () => {
    const shown = words(input());
    expect(shown).toEqual(expect.arrayContaining(['Rehearsal room 2', 'Revision 3', 'W-0417', 'W-0418']));
  });
  it('gives the phase a strip of its own, a third of the height, from −90 to +90', () => {
    const [magnitude, phase] = drawChart(input()).layout.strips;
    expect(phase!.rect.height / (magnitude!.rect.height + phase!.rect.height)).toBeCloseTo(1 / 3, 2);
    expect([phase!.scale.min, phase!.scale.max]).toEqual([-90, 90]);
  });
  it('draws a line as colour, dash and marker', () => {
    const curves = flat(drawChart(input()).curves);
    const second = curves.find((item) => item.kind === 'path' && item.stroke?.color === LIGHT_THEME.series[1]);
    expect(second).toMatchObject({ stroke: { dash: lineStyle(2).dash } });
    expect(curves.some((item) => item.kind === 'marker' && item.shape === 'square')).toBe(true);
  });
  it('writes names at the right end up to six lines, and none of them over another', () => {
    const six = drawChart(input({ sweeps: someSweeps(6, 300) }));
    const right = six.layout.frame.x + six.layout.frame.width;
    const ends = flat(six.frame).filter(
      (item) => item.kind === 'text' && item.x > right && item.y > six.layout.frame.y,
    );
    expect(ends).toHaveLength(6);
    const ys = ends.map((item) => (item.kind === 'text' ? item.y : 0)).sort((a, b) => a - b);
    for (let i = 1; i < ys.length; i += 1) expect(ys[i]! - ys[i - 1]!).toBeGreaterThanOrEqual(12);
    expect(drawChart(input({ sweeps: someSweeps(7, 300) })).layout.endLabelsX).toBeNull();
  });
  it('draws more than eight as one ramp, the chosen one full and the others at 45 %', () => {
    const twelve = input({ sweeps: someSweeps(12, 300), activeSweepId: 'sweep-12' });
    const lines = flat(drawChart(twelve).curves.slice(0, 1)).flatMap((item) =>
      item.kind === 'path' ? [item.stroke] : [],
    );
    expect(lines.filter((stroke) => stroke?.opacity === 0.45)).toHaveLength(11);
    expect(lines[lines.length - 1]).toMatchObject({ color: rampColor(LIGHT_THEME, 1).toLowerCase() });
    expect(words(twelve)).toContain('W-0417 … W-0428 (12)');
  });
  it('turns a pixel of the frame back into hertz', () => {
    const { frequency, frame } = drawChart(input()).layout;
    expect(valueAt(frequency, frame.x)).toBeCloseTo(10 / 1.05, 6);
    expect(valueAt(frequency, pixelOf(frequency, 31.8))).toBeCloseTo(31.8, 9);
  });
  it('says on the strip when the phase is unwrapped or its sign was turned', () => {
    const state = { ...FITTED_CHART, isPhaseUnwrapped: true };
    expect(words(input({ state, isPhaseTurned: true }))).toContain('unwrapped, sign turned on reading');
  });
  it('shows real and imaginary parts as two equal strips', () => {
    const { layout } = drawChart(input({ state: { ...FITTED_CHART, view: 'real-imaginary' } }));
    expect(layout.strips.map((strip) => strip.quantity)).toEqual(['real', 'imaginary']);
    expect(Math.abs(layout.strips[0]!.rect.height - layout.strips[1]!.rect.height)).toBeLessThanOrEqual(1);
  });
  it('survives a sweep without phase, no sweep at all, and a screen of 320 px', () => {
    const { frequencyHz } = someSweeps(1, 50)[0]!.points;
    const bare = { id: 'm', name: 'M', lineNumber: 1, points: { frequencyHz, magnitudeOhm: frequencyHz.map(() => 8) } };
    for (const change of [{ sweeps: [bare] }, { sweeps: [] }, { widthPx: 320, heightPx: 300 }]) {
      for (const item of flat(allLayers(drawChart(input(change))))) {
        if (item.kind === 'text') expect(Number.isFinite(item.x + item.y)).toBe(true);
      }
    }
  });
  it('draws a masked point hollow and crossed, and leaves it out of the line and of the range', () => {
    const [sweep] = someSweeps(1, 200);
    const magnitudeOhm = sweep!.points.frequencyHz.map((_, i) => (i === 100 ? 9000 : 8));
    const points = { frequencyHz: sweep!.points.frequencyHz, magnitudeOhm };
    const masked = Uint8Array.from({ length: 200 }, (_, i) => (i === 100 ? 1 : 0));
    const drawing = drawChart(input({ sweeps: [{ ...sweep!, points, masked }] }));
    expect(flat(drawing.curves).filter((item) => item.kind === 'marker' && item.shape === 'crossed-ring')).toHaveLength(
      1,
    );
    expect(drawing.layout.strips[0]!.scale.max).toBeLessThan(20);
  });
});

describe('cursors', () => {
  const state = { ...FITTED_CHART, cursorAHz: 31.8, cursorBHz: 210 };
  it('carry frequency, impedance and phase of the active sweep on their flags', () => {
    const shown = words(input({ state }));
    expect(shown).toContain('31.80\u00A0Hz');
    expect(shown.find((word) => /Ω .*°$/.test(word))).toMatch(/^4\d\.\d\d\u00A0Ω [+−]\d+\.\d°$/);
  });
  it('keep their flags above the frame and apart, however close they stand', () => {
    for (const b of [31.9, 33, 20_000, 10]) {
      const drawing = drawChart(input({ widthPx: 360, state: { ...state, cursorBHz: b } }));
      const boxes = drawing.cursors.flatMap((item) => (item.kind === 'rect' ? [item] : []));
      expect(boxes).toHaveLength(2);
      const [left, right] = boxes.sort((p, q) => p.x - q.x);
      expect(left!.x + left!.width).toBeLessThanOrEqual(right!.x);
      expect(left!.x).toBeGreaterThanOrEqual(0);
      expect(right!.x + right!.width).toBeLessThanOrEqual(360);
      expect(left!.y + left!.height).toBeLessThan(drawing.layout.frame.y);
    }
  });
  it('are not drawn where they are out of view', () => {
    const zoomed = { ...state, frequencyRangeHz: [100, 1000] as [number, number] };
    expect(drawChart(input({ state: zoomed })).cursors.filter((item) => item.kind === 'rect')).toHaveLength(1);
  });
});

describe('the SVG file', () => {
  const svg = chartSvg({ ...input({ theme: DARK_THEME }), title: 'A & B <"quoted">' });
  it('holds legend, units, title and description, and nothing that could run', () => {
    for (const part of ['W-0417', 'W-0418', 'Frequency, Hz', 'Impedance |Z|, Ω', 'Revision 3'])
      expect(svg).toContain(part);
    expect(svg).toContain('A &amp; B &lt;&quot;quoted&quot;&gt;');
    expect(svg).toContain(`<desc id="d">${chartSentence(input())}</desc>`);
    expect(svg).not.toMatch(/<script|<style|style=|NaN|undefined|Infinity/);
  });
  it('uses the light colours whatever the screen shows', () => {
    expect(svg).toContain(LIGHT_THEME.series[0]);
    expect(svg).not.toContain(DARK_THEME.sheet);
  });
});
