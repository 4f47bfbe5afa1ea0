import { allLayers, chartSvg, drawChart } from '../../../shared/drawing/chart.js';
import type { ChartInput } from '../../../shared/drawing/chart-input.js';
import { LIGHT_THEME } from '../../../shared/drawing/palette.js';
import { type CsvMarks, drawnPointsCsv } from '../../../shared/drawing/words/drawn-points-csv.js';
import { text } from '../../../shared/text.js';
import { paintOnCanvas } from './paint-canvas.js';

/** The chart as a file: the same drawing as on the screen, in the light colours, and its points as rows. */
const LEAST_WIDTH_PX = 960; // a phone's picture would have no room for names
const asPicture = (input: ChartInput): ChartInput => {
  const widthPx = Math.max(LEAST_WIDTH_PX, input.widthPx);
  const heightPx = Math.max(Math.round(widthPx * 0.55), input.heightPx);
  return { ...input, theme: LIGHT_THEME, textScale: 1, isStill: true, chosenCursor: undefined, widthPx, heightPx };
};

export function saveSvg(input: ChartInput): void {
  save(new Blob([chartSvg(asPicture(input))], { type: 'image/svg+xml' }), fileName(input, 'svg'));
}

export async function savePng(input: ChartInput, times: 1 | 2 | 3): Promise<void> {
  const picture = asPicture(input);
  await document.fonts?.ready;
  const canvas = document.createElement('canvas');
  canvas.width = picture.widthPx * times;
  canvas.height = picture.heightPx * times;
  const context = canvas.getContext('2d');
  if (!context) return;
  context.scale(times, times);
  context.fillStyle = LIGHT_THEME.sheet;
  context.fillRect(0, 0, picture.widthPx, picture.heightPx);
  paintOnCanvas(context, allLayers(drawChart(picture)), LIGHT_THEME);
  const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
  if (blob) save(blob, fileName(input, 'png'));
}

export function saveCsv(input: ChartInput, marks: CsvMarks): void {
  const drawn = input.sweeps.filter((sweep) => !sweep.isDimmed);
  const rows = drawnPointsCsv(drawn, input.state.frequencyRangeHz, marks);
  save(new Blob([`\uFEFF${rows}`], { type: 'text/csv;charset=utf-8' }), fileName(input, 'csv'));
}

function fileName({ title, sweeps }: ChartInput, ending: string): string {
  const name = title ?? sweeps[0]?.name ?? text.chart.export.fileName;
  const plain = name.replace(/[^\p{L}\p{N}]+/gu, '-').replace(/^-+|-+$/g, '');
  return `${plain.slice(0, 60) || text.chart.export.fileName}.${ending}`;
}
function save(blob: Blob, name: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
