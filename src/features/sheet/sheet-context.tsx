import { createContext, type ReactNode, useContext } from 'react';
import type { Result } from '../../../shared/contracts/result.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import type { Output } from '../../../shared/output.js';
import type { Points } from '../../../shared/points.js';
import type { SheetState } from './use-sheet-content.js';

/** What the page puts into a sheet from other features. */
export interface SheetSlots {
  /** Unpack, over the sheet. */
  unpack(slot: UnpackSlot): ReactNode;
  /** Name, role and what was told with a sweep. */
  conditions(sweep: SweepRow): ReactNode;
  /** The reading rule of a sweep, to be corrected. */
  readAgain(sweep: SweepRow): ReactNode;
}
export interface UnpackSlot {
  /** The sweeps that were stored, to be drawn. */
  onAdded(sweepIds: readonly string[]): void;
  onClose(): void;
}

/** What the panes of one sheet share. */
export interface SheetScene {
  readonly sheetId: string;
  readonly state: SheetState;
  readonly sweeps: readonly SweepRow[];
  readonly results: readonly Result[];
  readonly areResultsHere: boolean; // fetched: one that is missing now is in the bin
  /** Points of what is drawn or used by a card, by their hash, as far as they have arrived. */
  readonly points: ReadonlyMap<string, Points>;
  readonly activeSweepId: string | undefined;
  setActiveSweep(sweepId: string): void;
  /** Outputs whose curves and markers lie over the chart, by card. */
  readonly overlays: ReadonlyMap<string, Output>;
  setOverlay(cardId: string, output: Output | undefined): void;
  setCursorA(hz: number): void;
  openUnpack(files?: readonly File[]): void;
  readonly slots: SheetSlots;
  readonly readOnlyReason: string | undefined;
}

const SceneContext = createContext<SheetScene | undefined>(undefined);
export const SheetSceneProvider = SceneContext.Provider;

export function useSheetScene(): SheetScene {
  const scene = useContext(SceneContext);
  if (!scene) throw new Error('useSheetScene outside a sheet');
  return scene;
}
