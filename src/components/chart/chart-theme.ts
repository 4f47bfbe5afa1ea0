import { type ChartTheme, LIGHT_THEME } from '../../../shared/drawing/palette.js';

/** The colours of the page as the chart needs them, read from its tokens once per theme. */
const FORCED: ChartTheme = {
  ...LIGHT_THEME,
  sheet: 'Canvas',
  ink: 'CanvasText',
  soft: 'CanvasText',
  line: 'CanvasText',
  edge: 'CanvasText',
  grid: 'Canvas', // the light lines would shout
  gridStrong: 'GrayText',
  focus: 'Highlight',
  within: 'CanvasText',
  series: Array.from({ length: 8 }, () => 'CanvasText'), // dash, marker and name tell the lines apart
  ramp: Array.from({ length: 5 }, () => 'CanvasText'),
};
const kept = new Map<string, ChartTheme>();

export function readChartTheme(): ChartTheme {
  if (window.matchMedia?.('(forced-colors: active)').matches) return FORCED;
  const root = document.documentElement;
  const key = root.dataset.theme ?? 'light';
  const known = kept.get(key);
  if (known) return known;
  const style = getComputedStyle(root);
  const token = (name: string, fallback: string) => style.getPropertyValue(`--color-${name}`).trim() || fallback;
  const theme: ChartTheme = {
    sheet: token('sheet', LIGHT_THEME.sheet),
    ink: token('ink', LIGHT_THEME.ink),
    soft: token('soft', LIGHT_THEME.soft),
    line: token('line', LIGHT_THEME.line),
    edge: token('edge', LIGHT_THEME.edge),
    grid: token('grid', LIGHT_THEME.grid),
    gridStrong: token('grid-strong', LIGHT_THEME.gridStrong),
    focus: token('focus', LIGHT_THEME.focus),
    within: token('within', LIGHT_THEME.within),
    series: LIGHT_THEME.series.map((color, i) => token(`s${i + 1}`, color)),
    ramp: LIGHT_THEME.ramp.map((color, i) => token(`r${i + 1}`, color)),
    uiFont: style.getPropertyValue('--font-ui').trim() || LIGHT_THEME.uiFont,
    numFont: style.getPropertyValue('--font-num').trim() || LIGHT_THEME.numFont,
  };
  const shown = window.matchMedia?.('(prefers-contrast: more)').matches ? withMoreContrast(theme) : theme;
  if (style.getPropertyValue('--color-sheet')) kept.set(key, shown); // not before the page has its styles
  return shown;
}

const withMoreContrast = (theme: ChartTheme): ChartTheme => ({
  ...theme,
  soft: theme.ink,
  line: theme.edge,
  grid: theme.gridStrong,
  gridStrong: theme.edge,
});

/** Calls back when the page's theme, or forced colours, change. */
export function watchChartTheme(changed: () => void): () => void {
  const observer = new MutationObserver(changed);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme', 'data-density'] });
  const forced = window.matchMedia?.('(forced-colors: active)');
  forced?.addEventListener('change', changed);
  return () => {
    observer.disconnect();
    forced?.removeEventListener('change', changed);
  };
}
export const isWorkshop = (): boolean => document.documentElement.dataset.density === 'workshop';
export const prefersStillness = (): boolean => window.matchMedia?.('(prefers-reduced-motion: reduce)').matches ?? false;
