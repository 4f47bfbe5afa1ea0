import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { DataSource, EntityManager } from 'typeorm';
import { canonicalJson } from '../../shared/canonical-json.js';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { ReadingOverrides } from '../../shared/contracts/reading.js';
import type { SweepRevision, SweepRow } from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { recordChange } from '../activity/record-change.js';
import { lockRow } from '../database/edit-row.js';
import { SweepEntity, SweepPointsEntity, SweepRevisionEntity } from '../database/entities/sweep.entity.js';
import { pageOfRows } from '../database/paging.js';
import type { FileStore } from '../files/file-store.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import type { ReadFile } from '../reading/messages.js';
import { readOrRefuse } from '../reading/read-or-refuse.js';
import type { ReadingPool } from '../reading/reading-pool.js';
import { SWEEP, sweepTransaction } from './sweep-changes.js';
import { type LoadedSweep, loadedSweep, toRevision, toSweep } from './sweep-rows.js';

export class RevisionService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
    private readonly files: FileStore,
    private readonly reader: ReadingPool,
    private readonly temporaryFolder: string,
  ) {}

  async list(actor: Actor, sweepId: string, query: PageQuery): Promise<Page<SweepRevision>> {
    await this.access.require(actor, 'sweep:read', { sweepId });
    const rows = this.dataSource.manager.createQueryBuilder(SweepRevisionEntity, 'r');
    const { items, next } = await pageOfRows(rows.where('r.sweepId = :sweepId', { sweepId }), query);
    return { items: items.map(toRevision), next };
  }

  async points(actor: Actor, revisionId: string): Promise<{ sha256: string; content: Buffer }> {
    await this.access.require(actor, 'sweep:read', { revisionId });
    const { manager } = this.dataSource;
    const revision = await manager.findOneByOrFail(SweepRevisionEntity, { id: revisionId });
    const { content } = await manager.findOneByOrFail(SweepPointsEntity, { revisionId });
    return { sha256: revision.pointsSha256, content };
  }

  /** Reads the stored source again. The older revisions stay; the same reading as the newest makes none. */
  async reread(
    actor: Actor,
    sweepId: string,
    version: number | undefined,
    overrides: ReadingOverrides,
  ): Promise<SweepRow> {
    const grant = await this.access.require(actor, 'sweep:update', { sweepId });
    const before = await loadedSweep(this.dataSource.manager, sweepId);
    const read = await this.readStored(before, overrides);
    return sweepTransaction(this.dataSource, grant, async (manager) => {
      const row = await lockRow(manager, SweepEntity, sweepId);
      const current = await loadedSweep(manager, sweepId);
      if (version !== undefined && version !== row.version) {
        const detail = { current: toSweep(current), yours: { reading: overrides } };
        throw new AppError('version-conflict', text.server.versionConflict, detail);
      }
      if (isSameReading(current.revision, overrides, read)) return toSweep(current);
      const number = row.newestRevision + 1;
      await insertRevision(manager, { sweepId, number, overrides, read, personId: actor.personId });
      const after = await manager.save(Object.assign(row, { newestRevision: number }));
      const { teamId, projectId } = grant;
      await recordChange(manager, {
        ...{ actor, action: 'sweep:update', entity: 'sweep', entityId: sweepId, teamId, projectId },
        version: after.version,
        from: { revision: number - 1, reading: current.revision.overrides },
        to: { revision: number, reading: overrides },
      });
      return SWEEP.view(manager, sweepId);
    });
  }

  private async readStored({ sourceFile }: LoadedSweep, overrides: ReadingOverrides): Promise<ReadFile> {
    const folder = await mkdtemp(join(this.temporaryFolder, 'reread-'));
    try {
      const path = join(folder, 'source');
      await pipeline(this.files.read(sourceFile.id), createWriteStream(path));
      return await readOrRefuse(this.reader, { path, fileName: sourceFile.fileName, overrides });
    } finally {
      await rm(folder, { recursive: true, force: true, maxRetries: 3 });
    }
  }
}

function isSameReading(newest: SweepRevisionEntity, overrides: ReadingOverrides, read: ReadFile): boolean {
  const sameTold = canonicalJson(newest.overrides) === canonicalJson(overrides);
  return (
    sameTold &&
    newest.pointsSha256 === read.pointsSha256 &&
    canonicalJson(newest.reading) === canonicalJson(read.reading)
  );
}

export interface NewRevision {
  readonly sweepId: string;
  readonly number: number;
  readonly overrides: ReadingOverrides;
  readonly read: ReadFile;
  readonly personId: string;
}

/** The reading and its points, in two rows: lists never load the points. */
export async function insertRevision(manager: EntityManager, revision: NewRevision): Promise<void> {
  const { sweepId, number, overrides, read, personId } = revision;
  const { reading, findings, hasPhase, points, minFrequencyHz, maxFrequencyHz, pointsSha256 } = read;
  const row = manager.create(SweepRevisionEntity, {
    ...{
      sweepId,
      number,
      overrides,
      reading,
      findings,
      hasPhase,
      points,
      minFrequencyHz,
      maxFrequencyHz,
      pointsSha256,
    },
    createdById: personId,
  });
  const { id } = await manager.save(row);
  await manager.insert(SweepPointsEntity, { revisionId: id, content: Buffer.from(read.canonicalPoints) });
}
