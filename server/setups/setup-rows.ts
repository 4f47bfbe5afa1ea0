import type { EntityManager, SelectQueryBuilder } from 'typeorm';
import type { z } from 'zod';
import type { Setup, SetupVersionSchema } from '../../shared/contracts/setup.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import type { PersonEntity } from '../database/entities/person.entity.js';
import { SetupEntity, SetupVersionEntity } from '../database/entities/setup.entity.js';

type SetupVersion = z.infer<typeof SetupVersionSchema>;
export type LoadedSetupVersion = SetupVersionEntity & { createdBy: PersonEntity };
export type LoadedSetup = SetupEntity & { newest: LoadedSetupVersion };

/** Setups, each with its newest version and who made that. */
export function loadedSetups(manager: EntityManager): SelectQueryBuilder<LoadedSetup> {
  const newest = 'v.setupId = s.id AND v.number = (SELECT max(w.number) FROM setup_version w WHERE w.setup_id = s.id)';
  return manager
    .createQueryBuilder(SetupEntity, 's')
    .innerJoinAndMapOne('s.newest', SetupVersionEntity, 'v', newest)
    .innerJoinAndSelect('v.createdBy', 'who') as SelectQueryBuilder<LoadedSetup>;
}

export async function loadedSetup(manager: EntityManager, setupId: string): Promise<Setup> {
  const row = await loadedSetups(manager).where('s.id = :setupId', { setupId }).getOne();
  if (!row) throw new AppError('not-found', text.server.notFound);
  return toSetup(row);
}

export function loadedVersions(manager: EntityManager, setupId: string): SelectQueryBuilder<LoadedSetupVersion> {
  return manager
    .createQueryBuilder(SetupVersionEntity, 'v')
    .innerJoinAndSelect('v.createdBy', 'who')
    .where('v.setupId = :setupId', { setupId }) as SelectQueryBuilder<LoadedSetupVersion>;
}

export function toSetupVersion(row: LoadedSetupVersion): SetupVersion {
  const { id, number, calculatorId, calculatorVersion, settings, settingsVersion, note, createdBy } = row;
  return {
    ...{ id, number, calculatorId, calculatorVersion, settings, settingsVersion, note },
    createdAt: row.createdAt.toISOString(),
    createdBy: { id: createdBy.id, name: createdBy.name },
  };
}

export function toSetup(row: LoadedSetup): Setup {
  const { id, version, teamId, name, calculatorId } = row;
  return {
    ...{ id, version, teamId, name, calculatorId },
    newest: toSetupVersion(row.newest),
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}
