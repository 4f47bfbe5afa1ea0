import { createStore, get, set, type UseStore } from 'idb-keyval';

const MOST_IN_MEMORY = 200; // revisions; 20,000 points with phase are 480 kB

/** Points never change, so one copy by hash serves every screen; the browser keeps them for the next visit. */
export class PointsCache {
  private readonly memory = new Map<string, Promise<Uint8Array>>();
  private store: UseStore | undefined;

  constructor(private readonly databaseName = 'hummock-points') {}

  bytes(hash: string, fetchBytes: () => Promise<Uint8Array>): Promise<Uint8Array> {
    const known = this.memory.get(hash);
    if (known) return known;
    const coming = this.fromDisk(hash).then((kept) => kept ?? this.fetchAndKeep(hash, fetchBytes));
    coming.catch(() => this.memory.delete(hash));
    if (this.memory.size >= MOST_IN_MEMORY) {
      const oldest = this.memory.keys().next();
      if (!oldest.done) this.memory.delete(oldest.value);
    }
    this.memory.set(hash, coming);
    return coming;
  }

  private async fromDisk(hash: string): Promise<Uint8Array | undefined> {
    try {
      this.store ??= createStore(this.databaseName, 'points');
      return await get<Uint8Array>(hash, this.store);
    } catch {
      return undefined; // a window without storage only loses the speed
    }
  }

  private async fetchAndKeep(hash: string, fetchBytes: () => Promise<Uint8Array>): Promise<Uint8Array> {
    const bytes = await fetchBytes();
    if (this.store) void set(hash, bytes, this.store).catch(() => undefined);
    return bytes;
  }
}
