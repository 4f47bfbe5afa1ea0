import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { Sheet, SheetContent } from '../../../shared/contracts/sheet.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import {
  type EditHistory,
  edited,
  mergeContents,
  rebased,
  redone,
  type SheetEdit,
  startHistory,
  undone,
} from './sheet-edits.js';
import { type SaveState, SheetSaver } from './sheet-saver.js';

export interface Clash {
  readonly base: SheetContent; // what both started from
  readonly theirs: SheetContent;
  readonly fields: readonly (keyof SheetContent)[];
}
export interface SheetState {
  readonly content: SheetContent;
  readonly saveState: SaveState;
  readonly clash: Clash | null;
  readonly canUndo: boolean;
  readonly canRedo: boolean;
  edit(edit: SheetEdit, merge?: string): void;
  undo(): void;
  redo(): void;
  settleClash(whose: 'mine' | 'theirs'): void;
}

/**
 * A sheet's content with undo, saved by itself shortly after each edit. Where somebody else saved meanwhile, what only
 * one of both changed merges, and the same field changed twice is put to the person.
 */
export function useSheetContent(sheet: Sheet): SheetState {
  const [history, setHistory] = useState<EditHistory>(() => startHistory(sheet.content));
  const [clash, setClash] = useState<Clash | null>(null);
  const present = useRef(history.present);
  present.current = history.present;
  const takeTheirs = useCallback((base: SheetContent, theirs: Sheet) => {
    const { clashes } = mergeContents(base, present.current, theirs.content);
    if (clashes.length === 0) setHistory((now) => rebased(now, base, theirs.content));
    else setClash({ base, theirs: theirs.content, fields: clashes });
  }, []);
  const saveState = useSaver(sheet, history.present, clash !== null, takeTheirs);
  const settleClash = (whose: 'mine' | 'theirs') => {
    if (!clash) return;
    const { base, theirs, fields } = clash;
    const disputed = Object.fromEntries(fields.map((field) => [field, theirs[field]]));
    setHistory((now) => {
      const merged = rebased(now, base, theirs);
      return whose === 'mine' ? merged : { ...merged, present: { ...merged.present, ...disputed } };
    });
    setClash(null);
  };
  return {
    content: history.present,
    saveState,
    clash,
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
    edit: useCallback((edit: SheetEdit, merge?: string) => setHistory((now) => edited(now, edit, merge ?? null)), []),
    undo: useCallback(() => setHistory(undone), []),
    redo: useCallback(() => setHistory(redone), []),
    settleClash,
  };
}

function useSaver(
  sheet: Sheet,
  content: SheetContent,
  isHeld: boolean,
  onTheirs: (base: SheetContent, theirs: Sheet) => void,
): SaveState {
  const store = useProjectStore();
  const client = useQueryClient();
  const [saveState, setSaveState] = useState<SaveState>('saved');
  const first = useRef(sheet);
  const saver = useRef<SheetSaver>(undefined);
  useEffect(() => {
    const own = new SheetSaver(store, first.current, {
      onState: setSaveState,
      onSaved: (saved) => client.setQueryData([store.key, 'sheets', saved.id], saved),
      onTheirs,
    });
    saver.current = own;
    const leave = () => void own.save({ isLeaving: true });
    window.addEventListener('pagehide', leave);
    return () => {
      window.removeEventListener('pagehide', leave);
      own.dispose();
    };
  }, [store, client, onTheirs]);
  useEffect(() => {
    if (isHeld) saver.current?.hold();
    else saver.current?.want(content);
  }, [content, isHeld]);
  useEffect(() => {
    if (!isHeld) saver.current?.receive(sheet);
  }, [sheet, isHeld]);
  return saveState;
}
