import type { Readable } from 'node:stream';
import type { EntityManager } from 'typeorm';

/**
 * Where source files lie, byte for byte. A file is put within the transaction that writes its row, so that neither can
 * be there without the other; a store outside the database removes what it put when the transaction fails.
 */
export interface FileStore {
  /** Streams `bytes` bytes from `source` under the id. Throws when the stream brings more or fewer. */
  put(transaction: EntityManager, fileId: string, source: Readable, bytes: number): Promise<void>;
  /** The whole file as a stream; it fails when the file is not whole. */
  read(fileId: string): Readable;
  /** For the bin's daily job: removes the bytes of these files. */
  remove(transaction: EntityManager, fileIds: readonly string[]): Promise<void>;
}

export const CHUNK_BYTES = 1 << 20;

/** Cuts a stream into pieces of exactly `size` bytes; only the last may be shorter. */
export async function* inChunks(source: AsyncIterable<Buffer>, size = CHUNK_BYTES): AsyncGenerator<Buffer> {
  let waiting: Buffer[] = [];
  let waitingBytes = 0;
  for await (const piece of source) {
    let rest = piece;
    while (waitingBytes + rest.length >= size) {
      const taken = size - waitingBytes;
      yield Buffer.concat([...waiting, rest.subarray(0, taken)]);
      rest = rest.subarray(taken);
      waiting = [];
      waitingBytes = 0;
    }
    if (rest.length > 0) waiting.push(rest);
    waitingBytes += rest.length;
  }
  if (waitingBytes > 0) yield Buffer.concat(waiting);
}
