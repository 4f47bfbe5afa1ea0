import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import type { SweepRevision, SweepRow } from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import type { SourceFileEntity } from '../database/entities/source-file.entity.js';
import { SweepEntity, SweepRevisionEntity } from '../database/entities/sweep.entity.js';

/** A sweep with what every view of it needs: its source file and its newest reading. Points stay where they are. */
export type LoadedSweep = SweepEntity & { sourceFile: SourceFileEntity; revision: SweepRevisionEntity };

export function loadedSweeps(manager: EntityManager): SelectQueryBuilder<LoadedSweep> {
  const newest = 'r.sweepId = s.id AND r.number = s.newestRevision';
  return manager
    .createQueryBuilder(SweepEntity, 's')
    .innerJoinAndSelect('s.sourceFile', 'f')
    .innerJoinAndMapOne('s.revision', SweepRevisionEntity, 'r', newest) as SelectQueryBuilder<LoadedSweep>;
}

export async function loadedSweep(manager: EntityManager, sweepId: string): Promise<LoadedSweep> {
  const sweep = await loadedSweeps(manager).where('s.id = :sweepId', { sweepId }).getOne();
  if (!sweep) throw new AppError('not-found', text.server.notFound);
  return sweep;
}

export function toRevision(row: SweepRevisionEntity): SweepRevision {
  const { id, sweepId, number, reading, findings, hasPhase, points, minFrequencyHz, maxFrequencyHz } = row;
  return {
    ...{ id, sweepId, number, reading, findings, hasPhase, points, minFrequencyHz, maxFrequencyHz },
    pointsSha256: row.pointsSha256,
    createdAt: row.createdAt.toISOString(),
  };
}

export function toSweep(row: LoadedSweep): SweepRow {
  const { id, version, projectId, itemId, batchId, name, conditions, tags, sourceFile } = row;
  return {
    ...{ id, version, projectId, itemId, batchId, name, conditions, tags },
    group: row.groupName,
    source: {
      id: sourceFile.id,
      fileName: sourceFile.fileName,
      bytes: sourceFile.bytes,
      sha256: sourceFile.sha256,
    },
    revision: toRevision(row.revision),
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}
