import {
  BUTTON_ZOOM,
  chooseCursor,
  cursorHz,
  cursorToEnd,
  neighbourSweep,
  panAxis,
  stepCursor,
  swapScale,
  toExtremum,
  zoomFrequency,
} from '../chart-actions.js';
import type { ChartView } from '../chart-view.js';

/** Letters of the chart, by the character they type; a person can change them, or switch them off. */
export const CHART_LETTERS = {
  cursorA: 'a',
  cursorB: 'b',
  peak: 'p',
  dip: 'd',
  swapScale: 'l',
  marker: 'm',
  note: 'n',
  reference: 'r',
} as const;
export type ChartLetter = keyof typeof CHART_LETTERS;
export type ChartLetters = Readonly<Record<ChartLetter, string>>;

export interface KeyOptions {
  readonly view: ChartView;
  readonly letters: ChartLetters | 'off';
  readonly onFitAll: () => void;
  readonly onStepBack: () => void;
  readonly onActiveSweep: (id: string) => void;
  readonly onMarker?: ((hz: number) => void) | undefined;
  readonly onNote?: ((hz: number) => void) | undefined;
  readonly onReference?: (() => void) | undefined;
  readonly onCursorMoved: () => void;
  readonly onNoMore: () => void;
  readonly onScaleSwapped: (axis: 'frequency' | 'magnitude') => void;
}
export interface ChartKey {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}

/** Does what the key means; false when the key is not the chart's, so that the browser keeps it. */
export function pressChartKey(event: ChartKey, options: KeyOptions): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey) return false;
  return (
    pressNamedKey(event, options) || (options.letters !== 'off' && pressCharacter(event, options, options.letters))
  );
}

function pressNamedKey({ key, shiftKey }: ChartKey, options: KeyOptions): boolean {
  const { view } = options;
  switch (key) {
    case 'ArrowLeft':
    case 'ArrowRight': {
      const direction = key === 'ArrowRight' ? 1 : -1;
      if (shiftKey && !hasCursor(view)) panAxis(view, 'frequency', 0.1 * direction);
      else moved(options, () => stepCursor(view, direction * (shiftKey ? 10 : 1)));
      return true;
    }
    case 'ArrowUp':
    case 'ArrowDown':
      if (shiftKey) {
        const axis = view.currentLayout().strips[0]?.quantity ?? 'magnitude';
        panAxis(view, axis, key === 'ArrowUp' ? 0.1 : -0.1);
      } else {
        const next = neighbourSweep(view, key === 'ArrowDown' ? 1 : -1);
        if (next) options.onActiveSweep(next);
      }
      return true;
    case 'Home':
    case 'End':
      moved(options, () => cursorToEnd(view, key === 'Home' ? 'first' : 'last'));
      return true;
    case 'Backspace':
      options.onStepBack();
      return true;
    default:
      return false;
  }
}

function pressCharacter({ key, shiftKey }: ChartKey, options: KeyOptions, letters: ChartLetters): boolean {
  const { view } = options;
  if (key === '+' || key === '=') zoomFrequency(view, BUTTON_ZOOM);
  else if (key === '-' || key === '\u2212' || key === '_') zoomFrequency(view, 1 / BUTTON_ZOOM);
  else if (key === '0') options.onFitAll();
  else return pressLetter(key.toLowerCase(), shiftKey, options, letters);
  return true;
}

function pressLetter(character: string, shiftKey: boolean, options: KeyOptions, letters: ChartLetters): boolean {
  const { view } = options;
  const letter = (Object.keys(letters) as ChartLetter[]).find((name) => letters[name].toLowerCase() === character);
  switch (letter) {
    case 'cursorA':
    case 'cursorB':
      moved(options, () => chooseCursor(view, letter === 'cursorA' ? 'A' : 'B'));
      return true;
    case 'peak':
    case 'dip':
      if (toExtremum(view, letter, shiftKey ? -1 : 1)) options.onCursorMoved();
      else options.onNoMore();
      return true;
    case 'swapScale': {
      const axis = shiftKey ? 'frequency' : 'magnitude';
      swapScale(view, axis);
      options.onScaleSwapped(axis);
      return true;
    }
    case 'marker':
    case 'note': {
      const act = letter === 'marker' ? options.onMarker : options.onNote;
      const hz = cursorHz(view.store.get(), view.store.getChosenCursor());
      if (!act || hz === null) return false;
      act(hz);
      return true;
    }
    case 'reference':
      options.onReference?.();
      return options.onReference !== undefined;
    case undefined:
      return false;
  }
}
const moved = (options: KeyOptions, act: () => void): void => {
  act();
  options.onCursorMoved();
};
const hasCursor = (view: ChartView): boolean => {
  const { cursorAHz, cursorBHz } = view.store.get();
  return cursorAHz !== null || cursorBHz !== null;
};
