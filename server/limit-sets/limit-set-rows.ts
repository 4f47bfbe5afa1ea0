import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import type { z } from 'zod';
import type { LimitSet, LimitVersionSchema } from '../../shared/contracts/limit-set.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { LimitSetEntity, LimitVersionEntity } from '../database/entities/limit-set.entity.js';
import type { PersonEntity } from '../database/entities/person.entity.js';

type LimitVersion = z.infer<typeof LimitVersionSchema>;
export type LoadedLimitVersion = LimitVersionEntity & { createdBy: PersonEntity };
export type LoadedLimitSet = LimitSetEntity & { newest: LoadedLimitVersion };

/** Limit sets, each with its newest version and who made that. */
export function loadedLimitSets(manager: EntityManager): SelectQueryBuilder<LoadedLimitSet> {
  const newest =
    'v.limitSetId = s.id AND v.number = (SELECT max(w.number) FROM limit_version w WHERE w.limit_set_id = s.id)';
  return manager
    .createQueryBuilder(LimitSetEntity, 's')
    .innerJoinAndMapOne('s.newest', LimitVersionEntity, 'v', newest)
    .innerJoinAndSelect('v.createdBy', 'who') as SelectQueryBuilder<LoadedLimitSet>;
}

export async function loadedLimitSet(manager: EntityManager, limitSetId: string): Promise<LimitSet> {
  const row = await loadedLimitSets(manager).where('s.id = :limitSetId', { limitSetId }).getOne();
  if (!row) throw new AppError('not-found', text.server.notFound);
  return toLimitSet(row);
}

export function loadedVersions(manager: EntityManager, limitSetId: string): SelectQueryBuilder<LoadedLimitVersion> {
  return manager
    .createQueryBuilder(LimitVersionEntity, 'v')
    .innerJoinAndSelect('v.createdBy', 'who')
    .where('v.limitSetId = :limitSetId', { limitSetId }) as SelectQueryBuilder<LoadedLimitVersion>;
}

export function toLimitVersion(row: LoadedLimitVersion): LimitVersion {
  const { id, number, content, note, createdBy } = row;
  return {
    ...{ id, number, content, note },
    createdAt: row.createdAt.toISOString(),
    createdBy: { id: createdBy.id, name: createdBy.name },
  };
}

export function toLimitSet(row: LoadedLimitSet): LimitSet {
  const { id, version, teamId, name } = row;
  return {
    ...{ id, version, teamId, name },
    newest: toLimitVersion(row.newest),
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}
