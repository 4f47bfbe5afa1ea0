import { type EntityManager, In, IsNull } from 'typeorm';
import { calculatorById } from '../../calculators/index.js';
import type { CalculatorDefinition } from '../../calculators/kit/calculator.js';
import { checkedOutput } from '../../calculators/kit/checked-output.js';
import { parsedSettings } from '../../calculators/kit/run.js';
import type { CreateResult } from '../../shared/contracts/result.js';
import { AppError, InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { ItemEntity } from '../database/entities/item.entity.js';
import { SetupEntity, SetupVersionEntity } from '../database/entities/setup.entity.js';
import { SheetEntity } from '../database/entities/sheet.entity.js';
import { SweepRevisionEntity } from '../database/entities/sweep.entity.js';
import type { Grant } from '../permissions/access.js';

interface Issue {
  readonly path: string;
  readonly message: string;
}

/** Refuses a result whose lineage does not hold: every issue at once, each with its path. */
export async function requireSoundResult(manager: EntityManager, grant: Grant, result: CreateResult): Promise<void> {
  const projectId = grant.projectId ?? '';
  const issues = [
    ...calculatorIssues(result),
    ...(await inputIssues(manager, projectId, result)),
    ...(await placeIssues(manager, grant, result)),
  ];
  const [first] = issues;
  if (first) throw new AppError('validation-failed', first.message, { issues });
}

function calculatorIssues(result: CreateResult): Issue[] {
  const { calculatorId, calculatorVersion, settings, settingsVersion, output } = result;
  const definition = calculatorById(calculatorId);
  if (!definition) return [{ path: 'calculatorId', message: text.measurements.calculatorUnknown(calculatorId) }];
  if (calculatorVersion > definition.version)
    return [{ path: 'calculatorVersion', message: text.measurements.calculatorNewer(definition.version) }];
  const issues: Issue[] = [];
  try {
    parsedSettings(definition, settings, settingsVersion);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    issues.push({ path: `settings.${error.where}`, message: error.message });
  }
  try {
    checkedOutput(asDeclaredThen(definition, result), output);
  } catch (error) {
    issues.push({ path: 'output', message: error instanceof Error ? error.message : String(error) });
  }
  return issues;
}

/** An older version may have had other figures than the registry declares today: then its own are taken as declared. */
function asDeclaredThen(definition: CalculatorDefinition, { calculatorVersion, output }: CreateResult) {
  if (calculatorVersion === definition.version) return definition;
  const figures = output.figures.map(({ id, unit }) => ({
    id,
    unit,
    symbol: id,
    name: id,
    definition: '',
    source: '',
  }));
  return { ...definition, figures };
}

async function inputIssues(manager: EntityManager, projectId: string, { inputs }: CreateResult): Promise<Issue[]> {
  const ids = [...new Set(inputs.map((input) => input.revisionId))];
  const revisions = await manager.find(SweepRevisionEntity, {
    where: { id: In(ids), sweep: { projectId, deletedAt: IsNull() } },
    select: { id: true, sweepId: true, pointsSha256: true },
  });
  const byId = new Map(revisions.map((revision) => [revision.id, revision]));
  return inputs.flatMap((input, i): Issue[] => {
    const revision = byId.get(input.revisionId);
    if (!revision) return [{ path: `inputs.${i}.revisionId`, message: text.measurements.revisionNotHere }];
    if (revision.sweepId !== input.sweepId)
      return [{ path: `inputs.${i}.sweepId`, message: text.measurements.revisionOfOther }];
    if (revision.pointsSha256 !== input.pointsSha256)
      return [{ path: `inputs.${i}.pointsSha256`, message: text.measurements.pointsDiffer }];
    return [];
  });
}

async function placeIssues(manager: EntityManager, grant: Grant, result: CreateResult): Promise<Issue[]> {
  const { teamId } = grant;
  const projectId = grant.projectId ?? '';
  const living = { deletedAt: IsNull() };
  const { sheetId, itemId, setupVersionId, calculatorId } = result;
  const issues: Issue[] = [];
  if (sheetId && !(await manager.existsBy(SheetEntity, { id: sheetId, projectId, ...living })))
    issues.push({ path: 'sheetId', message: text.measurements.sheetNotHere });
  if (itemId && !(await manager.existsBy(ItemEntity, { id: itemId, projectId, ...living })))
    issues.push({ path: 'itemId', message: text.measurements.itemNotHere });
  if (setupVersionId) {
    const version = await manager.findOneBy(SetupVersionEntity, { id: setupVersionId, calculatorId });
    if (!version || !(await manager.existsBy(SetupEntity, { id: version.setupId, teamId, ...living })))
      issues.push({ path: 'setupVersionId', message: text.measurements.setupNotHere });
  }
  return issues;
}
