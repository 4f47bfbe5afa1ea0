import { promisifyRequest } from 'idb-keyval';

/** The browser's own database behind `/try`: one object store a kind, rows by id. */
export const LOCAL_STORES = ['sweeps', 'revisions', 'points', 'sources', 'sheets', 'results', 'items'] as const;
export type LocalStoreName = (typeof LOCAL_STORES)[number];

/** Rows to be put, by store and id. */
export type LocalChange = Partial<Record<LocalStoreName, Readonly<Record<string, unknown>>>>;

const DATABASE = 'hummock-try';
const VERSION = 1;

export class LocalDatabase {
  private opening: Promise<IDBDatabase> | undefined;

  constructor(private readonly name = DATABASE) {}

  async get<Row>(store: LocalStoreName, id: string): Promise<Row | undefined> {
    return promisifyRequest<Row | undefined>((await this.read(store)).get(id));
  }
  async all<Row>(store: LocalStoreName): Promise<Row[]> {
    return promisifyRequest<Row[]>((await this.read(store)).getAll());
  }

  /** Puts rows of several kinds in one transaction: all of them or none. */
  async put(rows: LocalChange): Promise<void> {
    const stores = LOCAL_STORES.filter((store) => rows[store]);
    const transaction = (await this.open()).transaction(stores, 'readwrite');
    putAll(transaction, rows);
    await finished(transaction);
  }

  /**
   * Puts what `decide` makes of every row of one kind, in the transaction that read them: no other tab comes between.
   * `decide` answers at once; what it throws is passed on, and nothing is changed.
   */
  async change<Row>(store: LocalStoreName, decide: (rows: Row[]) => LocalChange): Promise<void> {
    const transaction = (await this.open()).transaction([...LOCAL_STORES], 'readwrite');
    let refusal: unknown;
    const request: IDBRequest<Row[]> = transaction.objectStore(store).getAll();
    request.onsuccess = () => {
      try {
        putAll(transaction, decide(request.result));
      } catch (error) {
        refusal = error;
        transaction.abort();
      }
    };
    await finished(transaction).catch((error: unknown) => {
      throw refusal ?? error;
    });
  }

  async clear(): Promise<void> {
    const transaction = (await this.open()).transaction([...LOCAL_STORES], 'readwrite');
    for (const store of LOCAL_STORES) transaction.objectStore(store).clear();
    await finished(transaction);
  }

  private async read(store: LocalStoreName): Promise<IDBObjectStore> {
    return (await this.open()).transaction(store, 'readonly').objectStore(store);
  }

  private open(): Promise<IDBDatabase> {
    this.opening ??= new Promise((resolve, reject) => {
      const request = indexedDB.open(this.name, VERSION);
      request.onupgradeneeded = () => {
        for (const store of LOCAL_STORES) request.result.createObjectStore(store);
      };
      request.onsuccess = () => resolve(request.result);
      request.onerror = () => reject(request.error);
    });
    this.opening.catch(() => {
      this.opening = undefined; // a later try may be allowed
    });
    return this.opening;
  }
}

function putAll(transaction: IDBTransaction, rows: LocalChange): void {
  for (const [store, byId] of Object.entries(rows)) {
    for (const [id, row] of Object.entries(byId)) transaction.objectStore(store).put(row, id);
  }
}

function finished(transaction: IDBTransaction): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve();
    transaction.onabort = () => reject(transaction.error);
    transaction.onerror = () => reject(transaction.error);
  });
}
