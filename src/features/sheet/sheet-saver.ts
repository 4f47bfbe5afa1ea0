import type { Sheet, SheetContent } from '../../../shared/contracts/sheet.js';
import { ApiError } from '../../lib/api-error.js';
import { EditConflict, type ProjectStore } from '../../lib/project-store/project-store.js';

const SAVE_AFTER_MS = 600;
const TRY_AGAIN_MS = 4000;

export type SaveState = 'saved' | 'saving' | 'not-saved' | 'refused';
interface SaverEvents {
  onState(state: SaveState): void;
  onSaved(sheet: Sheet): void;
  /** Somebody else's newer version, and the content both started from. */
  onTheirs(base: SheetContent, theirs: Sheet): void;
}

/** Saves a sheet shortly after each edit, one request at a time, and again and again while there is no connection. */
export class SheetSaver {
  private wanted: SheetContent;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private isSending = false;

  constructor(
    private readonly store: Pick<ProjectStore, 'sheets' | 'readOnlyReason'>,
    private seen: Sheet, // the newest version known from the store
    private readonly events: SaverEvents,
  ) {
    this.wanted = seen.content;
  }

  get isDirty(): boolean {
    return this.wanted !== this.seen.content && this.store.readOnlyReason === undefined;
  }

  /** The content is now this; it will be saved shortly. */
  want(content: SheetContent): void {
    this.wanted = content;
    if (!this.isDirty) return;
    this.events.onState('saving');
    this.saveAfter(SAVE_AFTER_MS);
  }

  /** A newer version has arrived by itself. Our own answers are not news. */
  receive(theirs: Sheet): void {
    if (this.isSending || theirs.version <= this.seen.version) return;
    const base = this.seen.content;
    this.seen = theirs;
    this.events.onTheirs(base, theirs);
  }

  /** A question is open: nothing is sent until it is answered. */
  hold(): void {
    clearTimeout(this.timer);
  }

  async save({ isLeaving = false } = {}): Promise<void> {
    clearTimeout(this.timer);
    if (!this.isDirty || this.isSending) return;
    this.isSending = true;
    const content = this.wanted;
    try {
      const saved = await this.store.sheets.update(this.seen, { content }, isLeaving ? { keepalive: true } : {});
      this.seen = { ...saved, content };
      this.events.onSaved(saved);
      this.events.onState(this.isDirty ? 'saving' : 'saved');
      if (this.isDirty) this.saveAfter(0);
    } catch (error) {
      this.recover(error);
    } finally {
      this.isSending = false;
    }
  }

  dispose(): void {
    void this.save({ isLeaving: true });
    clearTimeout(this.timer);
  }

  private recover(error: unknown): void {
    if (error instanceof EditConflict) {
      const theirs = error.theirs as Sheet;
      const base = this.seen.content;
      this.seen = theirs;
      this.events.onTheirs(base, theirs);
      return;
    }
    const isRefused = error instanceof ApiError && error.status >= 400 && error.status < 500;
    this.events.onState(isRefused ? 'refused' : 'not-saved');
    if (!isRefused) this.saveAfter(TRY_AGAIN_MS);
  }

  private saveAfter(ms: number): void {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => void this.save(), ms);
  }
}
