import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import type { Trace } from '../../../../shared/output.js';
import { LineSample } from '../../../../src/components/chart/line-sample.js';
import { MiniCurve } from '../../../../src/components/chart/mini-curve.js';
import { MisfitPlot } from '../../../../src/components/chart/misfit-plot.js';
import { StillChart } from '../../../../src/components/chart/still-chart.js';
import { someSweeps } from '../../../e2e/chart-page/curves.js';
import { standInForScreen } from './screen-stand-ins.js';

beforeEach(() => {
  standInForScreen(400, 180);
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

it('a line sample shows colour, dash and marker of its number', () => {
  const { container } = render(<LineSample number={4} />);
  const svg = container.querySelector('svg');
  expect(svg?.style.getPropertyValue('--sample')).toBe('var(--color-s4)');
  expect(svg?.querySelector('line')?.getAttribute('stroke-dasharray')).toBe('10 4 2 4');
  expect(svg?.querySelector('path')?.getAttribute('d')).toMatch(/^M.*Z$/);
});

it('a misfit plot draws percent and says mean and worst in a sentence', () => {
  const trace: Trace = {
    id: 'misfit',
    label: 'Misfit',
    x: [10, 100, 1000, 10_000],
    y: [0.003, -0.004, 0.003, -0.004],
    xUnit: 'Hz',
    yUnit: '1',
    axis: 'residual',
  };
  render(<MisfitPlot traces={[trace]} locale="en" />);
  // root mean square of 0.3, 0.4, 0.3, 0.4 % is √0.125 = 0.354 %
  expect(screen.getByText(/^Misfit 0\.35\s% on average, at most 0\.4\s% at 100\sHz\.$/)).toBeTruthy();
  expect(screen.getByRole('img').textContent).toContain('Misfit, %');
});

it('a sketch is a picture with a name and the shape of the curve', () => {
  const [sweep] = someSweeps(1, 300);
  render(<MiniCurve points={sweep!.points} label="W-0417" lineNumber={2} />);
  const path = screen.getByRole('img', { name: 'W-0417' }).querySelector('path');
  expect(path?.getAttribute('stroke')).toBe('var(--color-s2)');
  const heights = [...(path?.getAttribute('d') ?? '').matchAll(/[ML][\d.]+ ([\d.]+)/g)].map((m) => Number(m[1]));
  expect(Math.min(...heights)).toBeCloseTo(4, 0); // the peak touches the upper edge
  expect(heights.length).toBeLessThan(150);
});

it('a still chart is a picture that says its sentence', () => {
  render(<StillChart content={{ sweeps: someSweeps(1, 300) }} locale="en" />);
  expect(screen.getByRole('img', { name: /^W-0417: peak/ }).textContent).toContain('Frequency, Hz');
});
