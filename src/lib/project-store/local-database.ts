import { promisifyRequest } from 'idb-keyval';

/** The browser's own database behind `/try`: one object store a kind, rows by id. */
export const LOCAL_STORES = ['sweeps', 'revisions', 'points', 'sources', 'sheets', 'results', 'items'] as const;
export type LocalStoreName = (typeof LOCAL_STORES)[number];

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
  async put(rows: Partial<Record<LocalStoreName, Readonly<Record<string, unknown>>>>): Promise<void> {
    const stores = LOCAL_STORES.filter((store) => rows[store]);
    const transaction = (await this.open()).transaction(stores, 'readwrite');
    for (const store of stores) {
      for (const [id, row] of Object.entries(rows[store] ?? {})) transaction.objectStore(store).put(row, id);
    }
    await finished(transaction);
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

function finished(transaction: IDBTransaction): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve();
    transaction.onabort = () => reject(transaction.error);
    transaction.onerror = () => reject(transaction.error);
  });
}
