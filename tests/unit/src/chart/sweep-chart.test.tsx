import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { type ChartContent, type ChartState, FITTED_CHART } from '../../../../shared/drawing/chart-input.js';
import { SweepChart } from '../../../../src/components/chart/sweep-chart.js';
import { someSweeps } from '../../../e2e/chart-page/curves.js';
import { type PaintedCanvas, standInForScreen } from './screen-stand-ins.js';

const content: ChartContent = { sweeps: someSweeps(2, 300), title: 'Bench drawer' };
let painted: PaintedCanvas;
let onStateChange: ReturnType<typeof vi.fn<(state: ChartState) => void>>;

beforeEach(() => {
  vi.useFakeTimers();
  painted = standInForScreen();
  onStateChange = vi.fn<(state: ChartState) => void>();
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

const last = (): ChartState => onStateChange.mock.lastCall?.[0] ?? FITTED_CHART;
function chart(props: Partial<Parameters<typeof SweepChart>[0]> = {}): HTMLElement {
  render(<SweepChart content={content} onStateChange={onStateChange} locale="en" {...props} />);
  return screen.getByRole('application');
}

describe('the chart', () => {
  it('is one focus stop with a name that says what it shows', () => {
    const root = chart();
    expect(root).toHaveProperty('tabIndex', 0);
    expect(root.getAttribute('aria-label')).toMatch(/^Bench drawer\. W-0417: peak 4[56]/);
    expect(root.querySelectorAll('[tabindex="0"]')).toHaveLength(0);
  });
  it('paints curves on the canvas, axes and legend in the SVG', () => {
    const root = chart();
    expect(painted.strokes).toBeGreaterThan(4);
    const words = [...root.querySelectorAll('svg text')].map((word) => word.textContent);
    expect(words).toEqual(expect.arrayContaining(['Frequency, Hz', 'Impedance |Z|, Ω', 'W-0417', 'W-0418']));
  });
  it('moves the cursor by keys and speaks after 250 ms of rest, not before', () => {
    const root = chart();
    fireEvent.keyDown(root, { key: 'a' });
    const peak = last().cursorAHz ?? 0;
    fireEvent.keyDown(root, { key: 'ArrowRight' });
    expect(last().cursorAHz).toBeGreaterThan(peak);
    act(() => vi.advanceTimersByTime(240));
    expect(screen.getByRole('status').textContent).toBe('');
    act(() => vi.advanceTimersByTime(20));
    expect(screen.getByRole('status').textContent).toMatch(
      /^Cursor A: 3\d\.\d\d\u00A0Hz, 4\d\.\d\d\u00A0Ω [+−]\d+\.\d°, W-0417$/,
    );
  });
  it('leaves letters alone where a person switched them off, and never takes Ctrl + letter', () => {
    const root = chart({ letters: 'off' });
    fireEvent.keyDown(root, { key: 'a' });
    fireEvent.keyDown(root, { key: '+' });
    expect(onStateChange).not.toHaveBeenCalled();
    fireEvent.keyDown(root, { key: 'ArrowRight' });
    expect(last().cursorAHz).not.toBeNull();
    expect(fireEvent.keyDown(root, { key: 'a', ctrlKey: true })).toBe(true); // not prevented
  });
  it('takes the letters that a person chose instead', () => {
    const root = chart({
      letters: {
        cursorA: 'x',
        cursorB: 'y',
        peak: 'p',
        dip: 'd',
        swapScale: 'l',
        marker: 'm',
        note: 'n',
        reference: 'r',
      },
    });
    fireEvent.keyDown(root, { key: 'a' });
    expect(onStateChange).not.toHaveBeenCalled();
    fireEvent.keyDown(root, { key: 'x' });
    expect(last().cursorAHz).not.toBeNull();
  });
  it('fits all and steps back, or asks the page to', () => {
    const root = chart({ state: { ...FITTED_CHART, frequencyRangeHz: [100, 1000] } });
    fireEvent.keyDown(root, { key: '0' });
    expect(last().frequencyRangeHz).toBeNull();
    fireEvent.keyDown(root, { key: 'Backspace' });
    expect(last().frequencyRangeHz).toEqual([100, 1000]);
    cleanup();
    const onStepBack = vi.fn();
    fireEvent.keyDown(chart({ onStepBack }), { key: 'Backspace' });
    expect(onStepBack).toHaveBeenCalledOnce();
  });
  it('has a button for every drag', () => {
    chart();
    for (const name of [
      'Zoom in',
      'Zoom out',
      'Pan left',
      'Pan right',
      'Fit all',
      'Step back',
      'Next peak',
      'Next dip',
    ]) {
      expect(screen.getByRole('button', { name })).toBeTruthy();
    }
    fireEvent.click(screen.getByRole('button', { name: 'Zoom in' }));
    const [low, high] = last().frequencyRangeHz ?? [0, 0];
    expect(high / low).toBeLessThan(21_000 / (10 / 1.05));
    fireEvent.click(screen.getByRole('button', { name: 'Magnitude axis: log' }));
    expect(last().magnitudeScale).toBe('linear');
  });
  it('follows the page when it says what to show', () => {
    const { rerender } = render(<SweepChart content={content} state={FITTED_CHART} locale="en" />);
    rerender(<SweepChart content={content} state={{ ...FITTED_CHART, frequencyRangeHz: [50, 500] }} locale="en" />);
    expect(screen.getByLabelText('Frequency from, Hz')).toHaveProperty('value', '50');
  });
});
