import { Readable } from 'node:stream';
import type { DataSource, EntityManager } from 'typeorm';
import { CHUNK_BYTES, type FileStore, inChunks } from './file-store.js';

const INSERT = 'INSERT INTO source_chunk (source_file_id, position, content) VALUES ($1, $2, $3)';
const ONE = 'SELECT content FROM source_chunk WHERE source_file_id = $1 AND position = $2';
const SIZE = 'SELECT bytes FROM source_file WHERE id = $1';

/** Files in rows of 1 MB in the product's own database: one row at a time in memory, both ways. */
export class PostgresFileStore implements FileStore {
  constructor(private readonly dataSource: DataSource) {}

  async put(transaction: EntityManager, fileId: string, source: Readable, bytes: number): Promise<void> {
    let position = 0;
    let stored = 0;
    for await (const content of inChunks(source)) {
      await transaction.query(INSERT, [fileId, position++, content]);
      stored += content.length;
    }
    if (stored !== bytes) throw new Error(`the stream of file ${fileId} brought ${stored} of ${bytes} bytes`);
  }

  read(fileId: string): Readable {
    return Readable.from(this.chunks(fileId), { objectMode: false });
  }

  async remove(transaction: EntityManager, fileIds: readonly string[]): Promise<void> {
    await transaction.query('DELETE FROM source_chunk WHERE source_file_id = ANY($1)', [fileIds]);
  }

  private async *chunks(fileId: string): AsyncGenerator<Buffer> {
    const [file]: { bytes: number }[] = await this.dataSource.query(SIZE, [fileId]);
    const rows = Math.ceil((file?.bytes ?? 0) / CHUNK_BYTES);
    for (let position = 0; position < rows; position++) {
      const [row]: { content: Buffer }[] = await this.dataSource.query(ONE, [fileId, position]);
      if (!row) throw new Error(`row ${position} of file ${fileId} is missing`);
      yield row.content;
    }
  }
}
