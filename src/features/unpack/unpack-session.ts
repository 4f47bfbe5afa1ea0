import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import type { ProjectStore } from '../../lib/project-store/project-store.js';
import { alreadyHere } from '../../lib/project-store/refusals.js';
import { type ReadOutcome, readInWorker } from '../../workers/pool.js';
import { type Job, JobStopped } from '../../workers/worker-pool.js';
import { KnownFiles } from './known-files.js';
import { canBeStored, type Entry, lookOf, newEntry, stateAfterReading } from './unpack-entry.js';

const UPLOADS_AT_ONCE = 2;
const PROGRESS_EVERY_MS = 150;

export interface UnpackState {
  readonly entries: readonly Entry[];
  readonly isStoring: boolean;
}
export interface StoredBatch {
  readonly batchId: string;
  readonly sweeps: readonly SweepRow[];
}

/**
 * One drop of files from reading to storing: reads each in the workers, keeps each one's state, stores them as one
 * batch. Lives outside React, so that no rendering holds the work up.
 */
export class UnpackSession {
  private state: UnpackState = { entries: [], isStoring: false };
  private readonly listeners = new Set<() => void>();
  private readonly jobs = new Map<string, Job<ReadOutcome>>();
  private batchId = crypto.randomUUID();
  private stored: SweepRow[] = [];
  private telling: ReturnType<typeof setTimeout> | undefined;
  private stopStoring: AbortController | undefined;
  private storing: Promise<void> | undefined;
  private readonly known: KnownFiles;

  constructor(private readonly store: ProjectStore) {
    this.known = new KnownFiles(store);
  }

  readonly subscribe = (listener: () => void) => {
    this.listeners.add(listener);
    return () => {
      this.listeners.delete(listener);
    };
  };
  readonly getState = () => this.state;

  addFiles(files: readonly File[]): void {
    const entries = files.map(newEntry);
    this.set({ entries: [...this.state.entries, ...entries] });
    for (const entry of entries) this.read(entry);
  }

  remove(id: string): void {
    this.stopReading(id);
    this.set({ entries: this.state.entries.filter((entry) => entry.id !== id) });
  }

  change(id: string, change: Partial<Entry>): void {
    const entries = this.state.entries.map((entry) => (entry.id === id ? { ...entry, ...change } : entry));
    this.set({ entries });
  }

  /** Gives several files the same conditions, item or whatever else is told with a sweep. */
  changeAll(ids: readonly string[], change: Pick<Partial<Entry>, 'conditions' | 'itemId'>): void {
    for (const id of ids) this.change(id, change);
  }

  /** Reads a file again with what the person said of it. */
  tell(id: string, overrides: ReadingOverrides): void {
    this.stopReading(id);
    this.change(id, { overrides, state: 'reading', share: 0 });
    const entry = this.entry(id);
    if (entry) this.read(entry);
  }

  /** The other files that were written the same way. */
  lookAlikes(id: string): Entry[] {
    const chosen = this.entry(id);
    const look = chosen && lookOf(chosen);
    if (look === undefined) return [];
    return this.state.entries.filter((entry) => entry.id !== id && canBeStored(entry) && lookOf(entry) === look);
  }
  tellLookAlikes(id: string): void {
    const overrides = this.entry(id)?.overrides ?? {};
    for (const entry of this.lookAlikes(id)) this.tell(entry.id, overrides);
  }

  /** Stops whatever is under way. What was stored of this batch is taken back: nothing is left behind. */
  async stop(): Promise<void> {
    for (const id of [...this.jobs.keys()]) this.stopReading(id);
    this.set({ entries: this.state.entries.filter(({ state }) => state !== 'reading') });
    this.stopStoring?.abort();
    await this.storing;
  }

  /** Takes up what was left unread when the screen went away. */
  resume(): void {
    for (const entry of this.state.entries) {
      if (entry.state === 'reading' && !this.jobs.has(entry.id)) this.read(entry);
    }
  }
  /** Ends all work of this session, when the screen goes away. */
  dispose(): void {
    for (const id of [...this.jobs.keys()]) this.stopReading(id);
  }

  /** What is stored of this drop so far. */
  batch(): StoredBatch {
    return { batchId: this.batchId, sweeps: this.stored };
  }

  /** Stores every file that can be stored. Resolves with the batch, or with undefined where it was stopped. */
  async storeAll(): Promise<StoredBatch | undefined> {
    const stopStoring = new AbortController();
    this.stopStoring = stopStoring;
    this.set({ isStoring: true });
    const storing = this.storeInTurn(stopStoring.signal);
    this.storing = storing.catch(() => {}); // whoever stops only waits for the end
    try {
      await storing;
      return stopStoring.signal.aborted ? undefined : this.batch();
    } finally {
      this.stopStoring = undefined;
      this.set({ isStoring: false });
    }
  }

  private async storeInTurn(signal: AbortSignal): Promise<void> {
    const waiting = this.state.entries.filter(canBeStored);
    const line = async () => {
      for (let entry = waiting.shift(); entry && !signal.aborted; entry = waiting.shift()) {
        await this.storeOne(entry, signal);
      }
    };
    await Promise.all(Array.from({ length: UPLOADS_AT_ONCE }, line));
    if (signal.aborted) await this.takeBack();
  }

  private async storeOne(entry: Entry, signal: AbortSignal): Promise<void> {
    const { id, file, name, conditions, itemId, overrides, outcome } = entry;
    this.change(id, { state: 'storing', share: 0, error: undefined });
    const sweep = { name, conditions, itemId, group: '', tags: [], batchId: this.batchId, reading: overrides };
    const read = outcome && 'file' in outcome ? { read: outcome.file } : {};
    const onProgress = (share: number) => this.progress(id, share);
    try {
      const row = await this.store.addSweep({ file, fileName: file.name }, sweep, { signal, onProgress, ...read });
      this.stored.push(row);
      this.change(id, { state: 'stored', share: 1 });
    } catch (error) {
      if (signal.aborted) this.change(id, { state: 'ready', share: 0 });
      else this.noteFailure(id, error);
    }
  }

  private noteFailure(id: string, error: unknown): void {
    const known = alreadyHere(error);
    if (known) this.change(id, { state: 'here', sameAs: known.name });
    else this.change(id, { state: 'not-stored', error });
  }

  /** Puts what was stored of a stopped batch into the bin; the next try is another batch. */
  private async takeBack(): Promise<void> {
    if (this.stored.length > 0) await this.store.undoBatch(this.batchId);
    for (const { id, state } of this.state.entries) {
      if (state === 'stored' || state === 'storing') this.change(id, { state: 'ready', share: 0 });
    }
    this.stored = [];
    this.batchId = crypto.randomUUID();
  }

  private read(entry: Entry): void {
    const { id, file, overrides } = entry;
    const request = { file, fileName: file.name, overrides };
    const job = readInWorker(request, (done, total) => {
      if (this.jobs.get(id) === job) this.progress(id, total > 0 ? done / total : 0);
    });
    this.jobs.set(id, job);
    job.done
      .then((outcome) => this.settle(id, job, outcome))
      .catch((error: unknown) => {
        if (error instanceof JobStopped || this.jobs.get(id) !== job) return;
        this.jobs.delete(id);
        this.change(id, { state: 'not-stored', error });
      });
  }

  private async settle(id: string, job: Job<ReadOutcome>, outcome: ReadOutcome): Promise<void> {
    if (this.jobs.get(id) !== job) return; // read again meanwhile
    this.jobs.delete(id);
    const reading = 'file' in outcome ? { reading: outcome.file.reading } : {};
    this.change(id, { outcome, state: stateAfterReading(outcome), share: 1, ...reading });
    if ('refused' in outcome) return;
    const sameAs = await this.sameFile(id, outcome.file.sourceSha256);
    if (sameAs !== undefined) this.change(id, { state: 'here', sameAs });
  }

  /** The name under which these bytes are here already: in this drop, or in the project. */
  private async sameFile(id: string, sha256: string): Promise<string | undefined> {
    for (const entry of this.state.entries) {
      if (entry.id === id) break;
      if (entry.outcome && 'file' in entry.outcome && entry.outcome.file.sourceSha256 === sha256)
        return entry.file.name;
    }
    return this.known.nameOf(sha256);
  }

  private stopReading(id: string): void {
    this.jobs.get(id)?.stop();
    this.jobs.delete(id);
  }
  private entry(id: string): Entry | undefined {
    return this.state.entries.find((entry) => entry.id === id);
  }
  /** Progress of many files comes often: it is kept at once and told together. */
  private progress(id: string, share: number): void {
    const entries = this.state.entries.map((entry) => (entry.id === id ? { ...entry, share } : entry));
    this.state = { ...this.state, entries };
    this.telling ??= setTimeout(() => this.tellListeners(), PROGRESS_EVERY_MS);
  }
  private set(change: Partial<UnpackState>): void {
    this.state = { ...this.state, ...change };
    this.tellListeners();
  }
  private tellListeners(): void {
    clearTimeout(this.telling);
    this.telling = undefined;
    for (const listener of this.listeners) listener();
  }
}
