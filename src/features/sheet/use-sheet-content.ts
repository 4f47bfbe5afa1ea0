import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { Sheet, SheetContent } from '../../../shared/contracts/sheet.js';
import { ApiError } from '../../lib/api-error.js';
import { EditConflict } from '../../lib/project-store/project-store.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { type EditHistory, edited, mergeContents, redone, type SheetEdit, startHistory, undone } from './sheet-edits.js';

const SAVE_AFTER_MS = 600;
const TRY_AGAIN_MS = 4000;

export type SaveState = 'saved' | 'saving' | 'not-saved';
export interface Clash {
  readonly theirs: Sheet;
  readonly merged: SheetContent;
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
 * A sheet's content with undo, saved by itself shortly after each edit. Where somebody else saved meanwhile, what both
 * left alone or changed alike merges, and the same field changed twice is put to the person.
 */
export function useSheetContent(sheet: Sheet): SheetState {
  const store = useProjectStore();
  const client = useQueryClient();
  const [history, setHistory] = useState<EditHistory>(() => startHistory(sheet.content));
  const [saveState, setSaveState] = useState<SaveState>('saved');
  const [clash, setClash] = useState<Clash | null>(null);
  const seen = useRef(sheet); // the newest version known from the store
  const latest = useRef(history);
  latest.current = history;
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const isSending = useRef(false);
  const key = [store.key, 'sheets', sheet.id];

  const takeTheirs = useCallback((theirs: Sheet): readonly (keyof SheetContent)[] => {
    const { content, clashes } = mergeContents(seen.current.content, latest.current.present, theirs.content);
    seen.current = theirs;
    if (clashes.length > 0) setClash({ theirs, merged: content, fields: clashes });
    else setHistory((current) => ({ ...current, present: content }));
    return clashes;
  }, []);

  const save = useCallback(async () => {
    clearTimeout(timer.current);
    const content = latest.current.present;
    if (store.readOnlyReason !== undefined || content === seen.current.content) return;
    if (isSending.current) {
      timer.current = setTimeout(() => void save(), SAVE_AFTER_MS);
      return;
    }
    isSending.current = true;
    setSaveState('saving');
    try {
      const saved = await store.sheets.update(seen.current, { content });
      seen.current = { ...saved, content };
      client.setQueryData(key, saved);
      setSaveState(latest.current.present === content ? 'saved' : 'saving');
    } catch (error) {
      if (error instanceof EditConflict) takeTheirs(error.theirs as Sheet);
      const isLost = error instanceof ApiError && error.status >= 400 && error.status < 500;
      setSaveState(isLost ? 'saved' : 'not-saved');
      if (!isLost) timer.current = setTimeout(() => void save(), TRY_AGAIN_MS);
    } finally {
      isSending.current = false;
    }
  }, [store, client, takeTheirs, ...key]);

  useEffect(() => {
    if (history.present === seen.current.content || clash) return;
    setSaveState((state) => (state === 'not-saved' ? state : 'saving'));
    timer.current = setTimeout(() => void save(), SAVE_AFTER_MS);
    return () => clearTimeout(timer.current);
  }, [history.present, clash, save]);

  useEffect(() => {
    const leave = () => void save();
    window.addEventListener('pagehide', leave);
    return () => {
      window.removeEventListener('pagehide', leave);
      leave();
    };
  }, [save]);

  useEffect(() => {
    if (sheet.version > seen.current.version && !isSending.current) takeTheirs(sheet);
  }, [sheet, takeTheirs]);

  return {
    content: history.present,
    saveState,
    clash,
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
    edit: useCallback((edit: SheetEdit, merge?: string) => setHistory((now) => edited(now, edit, merge ?? null)), []),
    undo: useCallback(() => setHistory(undone), []),
    redo: useCallback(() => setHistory(redone), []),
    settleClash: (whose) => {
      if (!clash) return;
      const theirFields = Object.fromEntries(clash.fields.map((field) => [field, clash.theirs.content[field]]));
      setHistory((now) => ({ ...now, present: whose === 'mine' ? clash.merged : { ...clash.merged, ...theirFields } }));
      setClash(null);
    },
  };
}
