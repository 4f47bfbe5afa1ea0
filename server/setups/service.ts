import type { DataSource, EntityManager } from 'typeorm';
import type { z } from 'zod';
import { calculatorById } from '../../calculators/index.js';
import { parsedSettings } from '../../calculators/kit/run.js';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import type { CreateSetup, PublishSetupSchema, Setup } from '../../shared/contracts/setup.js';
import { AppError, InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { publishNext } from '../activity/publish-next.js';
import { binRow, changeRow, type EditableKind, recordMade, unbinRow } from '../activity/recorded-edits.js';
import { SetupEntity, SetupVersionEntity } from '../database/entities/setup.entity.js';
import { pageOfRows } from '../database/paging.js';
import { violates } from '../database/violates.js';
import type { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { loadedSetup, loadedSetups, loadedVersions, toSetup, toSetupVersion } from './setup-rows.js';

type Publish = z.infer<typeof PublishSetupSchema>;
type SetupVersion = ReturnType<typeof toSetupVersion>;

const SETUP: EditableKind<SetupEntity, Setup> = {
  noun: 'setup',
  entity: SetupEntity,
  view: loadedSetup,
  told: ({ name, calculatorId }) => ({ name, calculatorId }),
};

export class SetupService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly access: Access,
  ) {}

  async list(actor: Actor, teamId: string, query: PageQuery): Promise<Page<Setup>> {
    await this.access.require(actor, 'setup:read', { teamId });
    const rows = loadedSetups(this.dataSource.manager).where('s.teamId = :teamId AND s.deletedAt IS NULL', { teamId });
    const { items, next } = await pageOfRows(rows, query);
    return { items: items.map(toSetup), next };
  }

  async create(actor: Actor, teamId: string, input: CreateSetup): Promise<Setup> {
    const grant = await this.access.require(actor, 'setup:create', { teamId });
    const { name, calculatorId } = input;
    const content = versionContent(calculatorId, input);
    return this.named(name, async (manager) => {
      const row = await manager.save(manager.create(SetupEntity, { teamId, name, calculatorId }));
      const first = { ...content, setupId: row.id, number: 1, createdById: actor.personId };
      await manager.save(manager.create(SetupVersionEntity, first));
      await recordMade(manager, SETUP, { actor, grant }, row);
      return SETUP.view(manager, row.id);
    });
  }

  async one(actor: Actor, setupId: string): Promise<Setup> {
    await this.access.require(actor, 'setup:read', { setupId });
    return SETUP.view(this.dataSource.manager, setupId);
  }

  async versions(actor: Actor, setupId: string, query: PageQuery): Promise<Page<SetupVersion>> {
    await this.access.require(actor, 'setup:read', { setupId });
    const { items, next } = await pageOfRows(loadedVersions(this.dataSource.manager, setupId), query);
    return { items: items.map(toSetupVersion), next };
  }

  /** The next number; the earlier ones stay as they are. */
  async publish(actor: Actor, id: string, version: number | undefined, input: Publish): Promise<Setup> {
    const grant = await this.access.require(actor, 'setup:update', { setupId: id });
    return this.dataSource.transaction((manager) =>
      publishNext(manager, SETUP, { actor, grant, id, version }, async (row, number) => {
        const content = versionContent(row.calculatorId, input);
        const next = { ...content, setupId: id, number, createdById: actor.personId };
        await manager.save(manager.create(SetupVersionEntity, next));
      }),
    );
  }

  async rename(actor: Actor, id: string, version: number, name: string): Promise<Setup> {
    const grant = await this.access.require(actor, 'setup:update', { setupId: id });
    return this.named(name, (manager) => changeRow(manager, SETUP, { actor, grant, id, version }, { name }));
  }

  async remove(actor: Actor, id: string, version: number | undefined): Promise<Setup> {
    const grant = await this.access.require(actor, 'setup:delete', { setupId: id });
    return this.dataSource.transaction((manager) => binRow(manager, SETUP, { actor, grant, id, version }));
  }

  async restore(actor: Actor, id: string, version: number | undefined): Promise<Setup> {
    const grant = await this.access.require(actor, 'setup:restore', { setupId: id });
    const { name } = await this.dataSource.manager.findOneByOrFail(SetupEntity, { id });
    return this.named(name, (manager) => unbinRow(manager, SETUP, { actor, grant, id, version }));
  }

  private async named<Answer>(name: string, work: (manager: EntityManager) => Promise<Answer>): Promise<Answer> {
    try {
      return await this.dataSource.transaction(work);
    } catch (error) {
      if (!violates(error, 'setup_team_id_name_live_key')) throw error;
      throw new AppError('name-taken', text.measurements.setupNameTaken(name), { name }, error);
    }
  }
}

/** The settings as the calculator takes them today, every default written out, so that a version never drifts. */
function versionContent(calculatorId: string, { settings, note }: Publish) {
  const definition = calculatorById(calculatorId);
  if (!definition) throw refused('calculatorId', text.measurements.calculatorUnknown(calculatorId));
  try {
    const parsed = parsedSettings(definition, settings) as Record<string, unknown>;
    const { version: calculatorVersion, settingsVersion } = definition;
    return { calculatorId, calculatorVersion, settings: parsed, settingsVersion, note };
  } catch (error) {
    if (error instanceof InputError) throw refused(`settings.${error.where}`, error.message);
    throw error;
  }
}

function refused(path: string, message: string): AppError {
  return new AppError('validation-failed', message, { issues: [{ path, message }] });
}
