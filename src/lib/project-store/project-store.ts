import type { CreateItem, Item, UpdateItem } from '../../../shared/contracts/item.js';
import type { ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { CreateResult, Result } from '../../../shared/contracts/result.js';
import type { CreateSheet, Sheet, UpdateSheet } from '../../../shared/contracts/sheet.js';
import type { CreateSweep, SweepRevision, SweepRow, UpdateSweep } from '../../../shared/contracts/sweep.js';
import type { Points } from '../../../shared/points.js';
import type { ReadFile } from '../../workers/messages.js';

/** A file as it came, byte for byte. */
export interface SourceBytes {
  readonly file: Blob;
  readonly fileName: string;
}
export interface AddOptions {
  readonly signal?: AbortSignal;
  /** Share done, 0 to 1. */
  readonly onProgress?: (share: number) => void;
  /** The reading of this very file with these very overrides, where the screen has it already. */
  readonly read?: ReadFile;
}
export interface KnownSource {
  readonly sha256: string;
  readonly sweepId: string;
  readonly name: string;
}
/** What moved in the project, from another tab or another person: the rows of this kind are to be fetched again. */
export type StoreEntity = 'project' | 'item' | 'sweep' | 'sheet' | 'result';

export interface UpdateOptions {
  /** Goes through even if the page is left meanwhile. */
  readonly keepalive?: boolean;
}

/** Rows that are edited one by one. An edit takes the row as it was seen: someone else's edit meanwhile is merged or
 * thrown as EditConflict. Deleting puts into the bin; `restore` takes it out again. */
export interface Rows<Row, Create, Update> {
  list(): Promise<Row[]>;
  get(id: string): Promise<Row>;
  add(row: Create): Promise<Row>;
  update(seen: Row, change: Update, options?: UpdateOptions): Promise<Row>;
  delete(seen: Row): Promise<void>;
  restore(id: string): Promise<Row>;
}

/**
 * Where a project lives: on the server, or in this browser alone (`/try`). Screens know only this interface, so that
 * every one of them works in both.
 */
export interface ProjectStore {
  readonly kind: 'server' | 'local';
  /** Begins every query key of this store. */
  readonly key: string;
  readonly projectId: string;
  /** Why nothing can be changed here, in words; undefined where it can. */
  readonly readOnlyReason: string | undefined;

  readonly sweeps: Omit<Rows<SweepRow, never, UpdateSweep>, 'add'>;
  readonly sheets: Rows<Sheet, CreateSheet, UpdateSheet>;
  readonly results: Rows<Result, CreateResult, { name: string }>;
  readonly items: Rows<Item, CreateItem, UpdateItem>;

  /** Stores a source and the sweep read from it. A file that is here already is recognised by `alreadyHere`. */
  addSweep(source: SourceBytes, sweep: CreateSweep, options?: AddOptions): Promise<SweepRow>;
  /** Which of these files (sha-256) are here already. */
  knownSources(sha256: readonly string[]): Promise<readonly KnownSource[]>;
  sourceBytes(sweep: SweepRow): Promise<SourceBytes>;
  /** The points of one revision; they never change, so they are kept by their hash. */
  points(revision: SweepRevision): Promise<Points>;
  revisions(sweepId: string): Promise<SweepRevision[]>;
  /** Reads the source again with another rule: a new revision, the older ones stay. */
  reread(sweep: SweepRow, reading: ReadingOverrides): Promise<SweepRow>;
  /** Takes a whole drop of files back, and brings it back. */
  undoBatch(batchId: string): Promise<void>;
  restoreBatch(batchId: string): Promise<void>;

  /** Calls back when something changed elsewhere; the answer ends it. */
  subscribe(onChange: (entity: StoreEntity, id: string) => void): () => void;
}

/** Two people changed the same value: both are shown, and the person decides. */
export class EditConflict<Row> extends Error {
  override readonly name = 'EditConflict';
  constructor(
    readonly theirs: Row,
    readonly fields: readonly string[],
  ) {
    super('edited meanwhile');
  }
}
