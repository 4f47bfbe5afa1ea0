import { type ChartState, FITTED_CHART } from '../../../shared/drawing/chart-input.js';
import type { CursorName } from '../../../shared/drawing/marks/cursors.js';

/** What of a chart changed: the page may keep ranges in the browser's history and cursors not. */
export type ChartChange = 'range' | 'cursor' | 'scale' | 'view';
export type SettledListener = (state: ChartState, change: ChartChange) => void;

/**
 * The state of one chart, or of several linked ones, while it moves. Gestures write here many times a second and
 * charts paint from here without React; a settled change (the finger is up, the wheel rests) is what a page stores.
 */
export class ChartStore {
  private live: ChartState;
  private settled: ChartState;
  private chosen: CursorName = 'A';
  private readonly past: ChartState[] = [];
  private readonly liveListeners = new Set<() => void>();
  private readonly settledListeners = new Set<() => void>();
  /** Called once for every settled change, not for states received from the page. */
  onSettled: SettledListener | undefined;

  constructor(state: ChartState = FITTED_CHART) {
    this.live = state;
    this.settled = state;
  }
  readonly get = (): ChartState => this.live;
  readonly getSettled = (): ChartState => this.settled;
  readonly getChosenCursor = (): CursorName => this.chosen;
  readonly subscribe = (listener: () => void): (() => void) => subscribeTo(this.liveListeners, listener);
  readonly subscribeSettled = (listener: () => void): (() => void) => subscribeTo(this.settledListeners, listener);

  /** Moves without settling: every frame of a gesture. */
  move(patch: Partial<ChartState>): void {
    this.live = { ...this.live, ...patch };
    this.tell();
  }
  /** Moves and settles: the end of a gesture, a key, a button. */
  settle(patch: Partial<ChartState>, change: ChartChange): void {
    const before = this.settled;
    this.live = { ...this.live, ...patch };
    if (sameState(before, this.live)) {
      this.tell();
      return;
    }
    if (change !== 'cursor') this.past.push(before);
    if (this.past.length > 100) this.past.shift();
    this.settled = this.live;
    this.tell();
    for (const listener of this.settledListeners) listener();
    this.onSettled?.(this.settled, change);
  }
  /** Back to what was settled: Esc during a gesture. */
  dropMove(): void {
    this.live = this.settled;
    this.tell();
  }
  /** The page says what it shows (first paint, undo, browser Back). */
  receive(state: ChartState): void {
    if (sameState(state, this.settled)) return;
    this.live = state;
    this.settled = state;
    this.tell();
    for (const listener of this.settledListeners) listener();
  }
  chooseCursor(cursor: CursorName): void {
    this.chosen = cursor;
    this.tell();
    for (const listener of this.settledListeners) listener();
  }
  /** The range before the last change, without touching the cursors; null when there is none. */
  takeBack(): Partial<ChartState> | null {
    const before = this.past.pop();
    if (!before) return null;
    const { cursorAHz: _a, cursorBHz: _b, ...rest } = before;
    return rest;
  }
  /** A step back is not a step forward: it leaves no entry behind. */
  settleBack(patch: Partial<ChartState>): void {
    const depth = this.past.length;
    this.settle(patch, 'range');
    this.past.length = depth;
  }
  private tell(): void {
    for (const listener of this.liveListeners) listener();
  }
}

function subscribeTo(listeners: Set<() => void>, listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
function sameState(a: ChartState, b: ChartState): boolean {
  return (Object.keys(a) as (keyof ChartState)[]).every((key) => {
    const [x, y] = [a[key], b[key]];
    if (Array.isArray(x) && Array.isArray(y)) return x[0] === y[0] && x[1] === y[1];
    return x === y;
  });
}
