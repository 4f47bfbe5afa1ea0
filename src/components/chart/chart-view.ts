import { drawChart } from '../../../shared/drawing/chart.js';
import {
  activeSweep,
  type ChartContent,
  type ChartInput,
  type ChartState,
} from '../../../shared/drawing/chart-input.js';
import type { Quantity } from '../../../shared/drawing/curves/columns.js';
import {
  type ChartLayout,
  fittedFrequency,
  fittedValues,
  layoutOf,
  type Strip,
  scaleKindOf,
  shownRange,
} from '../../../shared/drawing/layout.js';
import { drawCursors } from '../../../shared/drawing/marks/cursors.js';
import type { ChartTheme } from '../../../shared/drawing/palette.js';
import type { Primitive } from '../../../shared/drawing/primitives.js';
import { pixelOf, type Range, type ScaleKind } from '../../../shared/drawing/scales/axis-scale.js';
import { between, keptNear } from '../../../shared/drawing/scales/ranges.js';
import { svgOf } from '../../../shared/drawing/svg.js';
import { valueOfCurve } from '../../../shared/drawing/words/readout.js';
import type { ChartStore } from './chart-store.js';
import { isWorkshop, prefersStillness, readChartTheme } from './chart-theme.js';
import { paintOnCanvas } from './paint-canvas.js';

export interface ChartElements {
  readonly canvas: HTMLCanvasElement; // grid and curves
  readonly frame: SVGGElement; // neat line, ticks, words
  readonly cursors: SVGGElement;
  readonly rings: SVGGElement; // the one moving ornament: a ring around a new marker
}
export type AxisName = Quantity | 'frequency';
const MOVE_MS = 200;

/** Paints one chart from its store, at most once a frame and without React. */
export class ChartView {
  layout: ChartLayout | null = null;
  band: readonly Primitive[] = []; // the rubber band of a gesture
  private theme: ChartTheme = readChartTheme();
  private widthPx = 0;
  private heightPx = 0;
  private frameRequest = 0;
  private wantsAll = true;
  private painted: ChartState | null = null;
  private animation = 0;
  onPainted: (() => void) | undefined;

  constructor(
    private readonly elements: ChartElements,
    readonly store: ChartStore,
    private content: ChartContent,
    private locale: string | undefined,
  ) {}

  get sweeps() {
    return this.content.sweeps;
  }
  get active() {
    return activeSweep(this.content);
  }
  show(content: ChartContent, locale: string | undefined): void {
    const known = new Set(this.content.markers?.map(({ frequencyHz }) => frequencyHz));
    const added = (content.markers ?? []).filter(({ frequencyHz }) => !known.has(frequencyHz));
    this.content = content;
    this.locale = locale;
    this.requestAll();
    if (this.painted && !prefersStillness()) for (const { frequencyHz } of added) this.ring(frequencyHz);
  }
  private ring(hz: number): void {
    const { frequency, frame, strips } = this.currentLayout();
    const x = pixelOf(frequency, hz);
    const value = this.active && valueOfCurve(this.active.points, hz);
    const strip = strips.find(({ quantity }) => quantity === 'magnitude');
    if (!value || !strip || x < frame.x || x > frame.x + frame.width) return;
    const circle = document.createElementNS('http://www.w3.org/2000/svg', 'circle');
    circle.setAttribute('class', 'chart-ring');
    circle.setAttribute('cx', String(x));
    circle.setAttribute('cy', String(pixelOf(strip.scale, value.magnitudeOhm)));
    circle.setAttribute('r', '18');
    circle.addEventListener('animationend', () => circle.remove());
    this.elements.rings.append(circle);
  }
  resize(widthPx: number, heightPx: number): void {
    this.widthPx = Math.round(widthPx);
    this.heightPx = Math.round(heightPx);
    this.paintNow();
  }
  retheme(): void {
    this.theme = readChartTheme();
    this.requestAll();
  }
  requestAll(): void {
    this.wantsAll = true;
    this.request();
  }
  /** After a change of the store: repaints the curves only when something but a cursor moved. */
  readonly request = (): void => {
    if (this.frameRequest === 0) this.frameRequest = requestAnimationFrame(() => this.paintNow());
  };
  stop(): void {
    cancelAnimationFrame(this.frameRequest);
    cancelAnimationFrame(this.animation);
  }

  input(): ChartInput {
    return {
      ...this.content,
      state: this.store.get(),
      widthPx: this.widthPx,
      heightPx: this.heightPx,
      theme: this.theme,
      locale: this.locale,
      textScale: isWorkshop() ? 1.25 : 1,
      chosenCursor: this.store.getChosenCursor(),
    };
  }
  paintNow(): void {
    cancelAnimationFrame(this.frameRequest);
    this.frameRequest = 0;
    if (this.widthPx < 40 || this.heightPx < 40) return;
    const input = this.input();
    if (this.wantsAll || !this.painted || !onlyCursorsMoved(this.painted, input.state) || this.sizeChanged()) {
      this.paintAll(input);
    } else if (this.layout) {
      this.paintCursors([...this.band, ...drawCursors(input, this.layout)]);
    }
    this.painted = input.state;
    this.wantsAll = false;
    this.onPainted?.();
  }
  private sizeChanged(): boolean {
    return this.layout?.widthPx !== this.widthPx || this.layout.heightPx !== this.heightPx;
  }
  private paintAll(input: ChartInput): void {
    const { canvas, frame } = this.elements;
    const drawing = drawChart(input);
    this.layout = drawing.layout;
    const ratio = window.devicePixelRatio || 1;
    const [width, height] = [Math.round(this.widthPx * ratio), Math.round(this.heightPx * ratio)];
    if (canvas.width !== width || canvas.height !== height) {
      canvas.width = width;
      canvas.height = height;
    }
    const context = canvas.getContext('2d');
    if (context) {
      context.setTransform(ratio, 0, 0, ratio, 0, 0);
      context.clearRect(0, 0, this.widthPx, this.heightPx);
      paintOnCanvas(context, drawing.ground, this.theme);
      paintOnCanvas(context, drawing.curves, this.theme);
    }
    frame.innerHTML = svgOf(drawing.frame, this.theme, 'frame');
    this.paintCursors([...this.band, ...drawing.cursors]);
  }
  private paintCursors(items: readonly Primitive[]): void {
    this.elements.cursors.innerHTML = svgOf(items, this.theme, 'cursor');
  }
  /** Where things will stand, worked out even before the first paint. */
  currentLayout(): ChartLayout {
    this.layout ??= layoutOf(this.input());
    return this.layout;
  }

  kindOf(axis: AxisName): ScaleKind {
    const state = this.store.get();
    return axis === 'frequency' ? state.frequencyScale : scaleKindOf(axis, state);
  }
  rangeOf(axis: AxisName): Range {
    return shownRange({ sweeps: this.content.sweeps, state: this.store.get() }, axis);
  }
  fitOf(axis: AxisName): Range {
    const of = { sweeps: this.content.sweeps, state: this.store.get() };
    return axis === 'frequency' ? fittedFrequency(of) : fittedValues(of, axis);
  }
  /** A range brought near the data, as a patch of the state. */
  rangePatch(axis: AxisName, range: Range): Partial<ChartState> {
    return patchOf(axis, keptNear(range, this.fitOf(axis), this.kindOf(axis)));
  }
  stripAt(y: number): Strip | undefined {
    return this.currentLayout().strips.find(({ rect }) => y >= rect.y && y <= rect.y + rect.height);
  }

  /** Changes ranges so that the eye can follow: 200 ms, at once for people who want stillness. */
  moveTo(patch: Partial<ChartState>, settle: (patch: Partial<ChartState>) => void): void {
    cancelAnimationFrame(this.animation);
    const axes = movedAxes(patch).filter((axis) => !('frequencyScale' in patch) || axis !== 'frequency');
    if (prefersStillness() || axes.length === 0 || !this.layout) {
      settle(patch);
      return;
    }
    const start = performance.now();
    const from = axes.map((axis) => this.rangeOf(axis));
    const to = axes.map((axis) => patchedRange(patch, axis) ?? this.fitOf(axis));
    const frame = (now: number) => {
      const part = Math.min(1, Math.max(0, (now - start) / MOVE_MS));
      if (part >= 1) {
        settle(patch);
        return;
      }
      const eased = 1 - (1 - part) ** 3;
      const step = axes.map((axis, i) =>
        patchOf(axis, between(from[i] ?? [0, 1], to[i] ?? [0, 1], this.kindOf(axis), eased)),
      );
      this.store.move(Object.assign({}, ...step));
      this.animation = requestAnimationFrame(frame);
    };
    this.animation = requestAnimationFrame(frame);
  }
}

const RANGE_KEYS = {
  frequency: 'frequencyRangeHz',
  magnitude: 'magnitudeRangeOhm',
  phase: 'phaseRangeDeg',
  real: 'realRangeOhm',
  imaginary: 'imaginaryRangeOhm',
} as const satisfies Record<AxisName, keyof ChartState>;
const AXES = Object.keys(RANGE_KEYS) as AxisName[];

export function patchOf(axis: AxisName, range: Range | null): Partial<ChartState> {
  return { [RANGE_KEYS[axis]]: range && [range[0], range[1]] };
}
export const patchedRange = (patch: Partial<ChartState>, axis: AxisName): Range | null =>
  patch[RANGE_KEYS[axis]] ?? null;
const movedAxes = (patch: Partial<ChartState>): AxisName[] => AXES.filter((axis) => RANGE_KEYS[axis] in patch);
/** Everything shown again, on every axis. */
export const FIT_ALL: Partial<ChartState> = Object.assign({}, ...AXES.map((axis) => patchOf(axis, null)));

function onlyCursorsMoved(a: ChartState, b: ChartState): boolean {
  return (Object.keys(b) as (keyof ChartState)[]).every(
    (key) => key === 'cursorAHz' || key === 'cursorBHz' || a[key] === b[key],
  );
}
