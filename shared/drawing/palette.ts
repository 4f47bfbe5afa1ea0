import type { MarkerShape } from './primitives.js';

/** The colours and faces that a drawing is made with. The screen reads them from its tokens; paper uses LIGHT_THEME. */
export interface ChartTheme {
  readonly sheet: string;
  readonly ink: string;
  readonly soft: string;
  readonly line: string;
  readonly edge: string;
  readonly grid: string;
  readonly gridStrong: string;
  readonly focus: string;
  readonly within: string;
  readonly series: readonly string[]; // 8, in the order of LINE_STYLES
  readonly ramp: readonly string[]; // 5, lightness always in one direction
  readonly uiFont: string;
  readonly numFont: string;
}

const FONTS = {
  uiFont: '"Geologica Variable", Geologica, system-ui, sans-serif',
  numFont: '"Commit Mono", ui-monospace, monospace',
} as const;

export const LIGHT_THEME: ChartTheme = {
  sheet: '#FDFEFC',
  ink: '#17211D',
  soft: '#4A5852',
  line: '#CDD5CC',
  edge: '#717E77',
  grid: '#E4EAE2',
  gridStrong: '#D5DDD3',
  focus: '#0B5CAD',
  within: '#1F6444',
  series: ['#791066', '#2591E4', '#226B4A', '#9F8922', '#671CE4', '#AE2F00', '#331D1E', '#86898D'],
  ramp: ['#5F114F', '#64317D', '#5E51A5', '#4C73C2', '#2696D1'],
  ...FONTS,
};

export const DARK_THEME: ChartTheme = {
  sheet: '#161D1A',
  ink: '#E7EDE8',
  soft: '#A9B6AF',
  line: '#2D3833',
  edge: '#74827B',
  grid: '#222C28',
  gridStrong: '#2F3B35',
  focus: '#7CC4FF',
  within: '#86C9A0',
  series: ['#CD84A9', '#66D2FF', '#91B87E', '#F4E14D', '#7A6DFB', '#D06535', '#92716E', '#D2D5DA'],
  ramp: ['#FFD7F2', '#DFBDF2', '#B1AAF1', '#759CE7', '#0090CE'],
  ...FONTS,
};

export interface LineStyle {
  readonly name: string;
  readonly dash: readonly number[];
  readonly marker: MarkerShape;
}
/** Lines 1 to 8: a line is colour plus dash plus marker, so that it is known without colour. */
export const LINE_STYLES: readonly LineStyle[] = [
  { name: 'heather', dash: [], marker: 'dot' },
  { name: 'tarn', dash: [8, 4], marker: 'square' },
  { name: 'moss', dash: [2, 4], marker: 'triangle' },
  { name: 'gorse', dash: [10, 4, 2, 4], marker: 'diamond' },
  { name: 'bilberry', dash: [], marker: 'ring' },
  { name: 'rust', dash: [4, 3], marker: 'hollow-square' },
  { name: 'peat', dash: [14, 4], marker: 'hollow-triangle' },
  { name: 'slate', dash: [10, 3, 2, 3, 2, 3], marker: 'hollow-diamond' },
];
export const MOST_NUMBERED_LINES = LINE_STYLES.length;

export function lineStyle(lineNumber: number): LineStyle {
  return LINE_STYLES[(lineNumber - 1) % MOST_NUMBERED_LINES] ?? { name: 'heather', dash: [], marker: 'dot' };
}
export function lineColor(theme: ChartTheme, lineNumber: number): string {
  return theme.series[(lineNumber - 1) % theme.series.length] ?? theme.ink;
}

const HEX = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i;

/** Colour of an ordered series at `part` (0 to 1), mixed between the steps of the ramp; a system colour stays as it is. */
export function rampColor(theme: ChartTheme, part: number): string {
  const place = Math.min(1, Math.max(0, part)) * (theme.ramp.length - 1);
  const low = Math.min(theme.ramp.length - 2, Math.floor(place));
  const from = theme.ramp[low] ?? theme.ink;
  const a = HEX.exec(from);
  const b = HEX.exec(theme.ramp[low + 1] ?? theme.ink);
  if (!a || !b) return from;
  const mixed = [1, 2, 3].map((k) => {
    const start = Number.parseInt(a[k] ?? '0', 16);
    const value = Math.round(start + (Number.parseInt(b[k] ?? '0', 16) - start) * (place - low));
    return value.toString(16).padStart(2, '0');
  });
  return `#${mixed.join('')}`;
}
