import type { SheetContent } from '../contracts/sheet.js';
import type { ImpedancePoints } from './curves/columns.js';
import type { ChartTheme } from './palette.js';

/** What a sheet stores of its chart, and a chart changes. A range of null shows everything. */
export type ChartState = Pick<
  SheetContent,
  | 'view'
  | 'frequencyRangeHz'
  | 'magnitudeRangeOhm'
  | 'phaseRangeDeg'
  | 'realRangeOhm'
  | 'imaginaryRangeOhm'
  | 'frequencyScale'
  | 'magnitudeScale'
  | 'isPhaseUnwrapped'
  | 'cursorAHz'
  | 'cursorBHz'
>;
export const FITTED_CHART: ChartState = {
  view: 'magnitude-phase',
  frequencyRangeHz: null,
  magnitudeRangeOhm: null,
  phaseRangeDeg: null,
  realRangeOhm: null,
  imaginaryRangeOhm: null,
  frequencyScale: 'log',
  magnitudeScale: 'log',
  isPhaseUnwrapped: false,
  cursorAHz: null,
  cursorBHz: null,
};

export interface ChartSweep {
  readonly id: string;
  readonly name: string;
  readonly lineNumber: number; // 1 to 8, kept while drawn; more than eight sweeps are drawn as one ramp
  readonly points: ImpedancePoints;
  readonly masked?: Uint8Array; // (n), 1 = left out of calculations: hollow and crossed
  readonly isReference?: boolean;
  readonly isDimmed?: boolean; // the raw line under a smoothed one
}
/** A curve that a calculator made, over the same axes. */
export interface ModelCurve {
  readonly id: string;
  readonly label: string;
  readonly points: ImpedancePoints;
}
export interface ChartMarker {
  readonly frequencyHz: number;
  readonly label: string;
}
/** Shapes (n); limits are drawn in moss with edges, an uncertainty in the colour of its line. */
export interface ChartBand {
  readonly kind: 'limits' | 'uncertainty';
  readonly quantity: 'magnitude' | 'phase';
  readonly label: string;
  readonly frequencyHz: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly lineNumber?: number;
}
/** What is drawn, whatever the size, the range and the colours. */
export interface ChartContent {
  readonly sweeps: readonly ChartSweep[];
  readonly models?: readonly ModelCurve[];
  readonly markers?: readonly ChartMarker[];
  readonly bands?: readonly ChartBand[];
  readonly activeSweepId?: string | undefined; // its values stand at the cursors; the first one when absent
  readonly title?: string | undefined;
  readonly revision?: string | undefined; // "Revision 3", part of the picture
  readonly isPhaseTurned?: boolean; // the sign of the phase was turned on reading: written on the strip
}
export interface ChartInput extends ChartContent {
  readonly state: ChartState;
  readonly widthPx: number;
  readonly heightPx: number;
  readonly theme: ChartTheme;
  readonly locale?: string | undefined;
  readonly textScale?: number; // 1.25 in the workshop
  readonly chosenCursor?: 'A' | 'B' | undefined;
  readonly isStill?: boolean; // nobody will set a cursor: no room is kept for flags that are not there
}

/** The sweep whose values the cursors show. */
export function activeSweep(content: ChartContent): ChartSweep | undefined {
  return content.sweeps.find((sweep) => sweep.id === content.activeSweepId) ?? content.sweeps.find((s) => !s.isDimmed);
}
