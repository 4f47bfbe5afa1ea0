import { createReadStream } from 'node:fs';
import type { Readable } from 'node:stream';
import type { DataSource, EntityManager } from 'typeorm';
import type { CreateSweep, SourceFile, SweepRow } from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { recordMade } from '../activity/recorded-edits.js';
import { SourceFileEntity } from '../database/entities/source-file.entity.js';
import { SweepEntity } from '../database/entities/sweep.entity.js';
import { retriedTransaction } from '../database/retried-transaction.js';
import { violates } from '../database/violates.js';
import type { FileStore } from '../files/file-store.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { readOrRefuse } from '../reading/read-or-refuse.js';
import type { ReadingPool } from '../reading/reading-pool.js';
import { requireNamedItems } from '../sweeps/named-items.js';
import { insertRevision } from '../sweeps/revisions.js';
import { LIVE_SOURCE_KEY, SWEEP } from '../sweeps/sweep-changes.js';
import { loadedSweeps } from '../sweeps/sweep-rows.js';
import type { ReceivedFile } from './receive-upload.js';

export interface KnownSource {
  readonly sha256: string;
  readonly sweepId: string;
  readonly name: string;
}

export class SourceService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
    private readonly files: FileStore,
    private readonly reader: ReadingPool,
  ) {}

  /** Reads the received file and keeps it with its sweep: all of it in one transaction, or nothing. */
  async add(
    actor: Actor,
    projectId: string,
    file: ReceivedFile,
    input: CreateSweep,
    abandoned?: AbortSignal,
  ): Promise<SweepRow> {
    const grant = await this.access.require(actor, 'source:create', { projectId });
    await requireNamedItems(this.dataSource.manager, projectId, input);
    await this.refuseKnown(projectId, file.sha256);
    const { path, fileName } = file;
    const read = await readOrRefuse(this.reader, { path, fileName, overrides: input.reading });
    abandoned?.throwIfAborted();
    try {
      return await retriedTransaction(this.dataSource, async (manager) => {
        const sourceFileId = await this.keepFile(manager, actor, projectId, file);
        const { group: groupName, reading: overrides, ...rest } = input;
        const row = manager.create(SweepEntity, { ...rest, projectId, sourceFileId, groupName, newestRevision: 1 });
        const sweep = await manager.save(row);
        await insertRevision(manager, { sweepId: sweep.id, number: 1, overrides, read, personId: actor.personId });
        const { batchId } = sweep;
        const told = (row: SweepEntity) => ({ ...SWEEP.told(row), batchId, fileName, sha256: file.sha256 });
        await recordMade(manager, { ...SWEEP, told }, { actor, grant }, sweep);
        return SWEEP.view(manager, sweep.id);
      });
    } catch (error) {
      if (violates(error, LIVE_SOURCE_KEY)) await this.refuseKnown(projectId, file.sha256); // the other upload won
      throw error;
    }
  }

  async known(actor: Actor, projectId: string, sha256: readonly string[]): Promise<KnownSource[]> {
    await this.access.require(actor, 'source:read', { projectId });
    return this.livingBySha(projectId, sha256);
  }

  async content(actor: Actor, sourceId: string): Promise<{ file: SourceFile; open: () => Readable }> {
    await this.access.require(actor, 'source:read', { sourceId });
    const file = await this.dataSource.manager.findOneByOrFail(SourceFileEntity, { id: sourceId });
    return { file, open: () => this.files.read(sourceId) };
  }

  private async refuseKnown(projectId: string, sha256: string): Promise<void> {
    const [known] = await this.livingBySha(projectId, [sha256]);
    if (!known) return;
    const { sweepId, name } = known;
    throw new AppError('already-here', text.measurements.alreadyHere(name), { sweepId, name });
  }

  private async livingBySha(projectId: string, sha256: readonly string[]): Promise<KnownSource[]> {
    const sweeps = await loadedSweeps(this.dataSource.manager)
      .where('s.projectId = :projectId AND s.deletedAt IS NULL AND f.sha256 IN (:...sha256)', { projectId, sha256 })
      .getMany();
    return sweeps.map(({ id, name, sourceFile }) => ({ sha256: sourceFile.sha256, sweepId: id, name }));
  }

  /**
   * The id of the kept file. The same content is kept once in a project, also when its sweep lies in the bin; writing
   * the row again changes nothing but locks it, so that the bin's job cannot remove it meanwhile.
   */
  private async keepFile(manager: EntityManager, actor: Actor, projectId: string, file: ReceivedFile): Promise<string> {
    const { path, fileName, bytes, sha256 } = file;
    const [row]: { id: string; isNew: boolean }[] = await manager.query(
      `INSERT INTO source_file (project_id, file_name, bytes, sha256, created_by_id) VALUES ($1, $2, $3, $4, $5)
       ON CONFLICT (project_id, sha256) DO UPDATE SET project_id = excluded.project_id
       RETURNING id, xmax = 0 AS "isNew"`, // xmax is 0 only for a row that this statement made
      [projectId, fileName, bytes, sha256, actor.personId],
    );
    if (!row) throw new Error('the source file was not kept');
    if (row.isNew) await this.files.put(manager, row.id, createReadStream(path), bytes);
    return row.id;
  }
}
