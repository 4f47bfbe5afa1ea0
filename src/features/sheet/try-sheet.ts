import { calculatorById } from '../../../calculators/index.js';
import { assignRoles, type Candidate } from '../../../calculators/kit/assign-roles.js';
import { SheetContentSchema } from '../../../shared/contracts/sheet.js';
import { CreateSweepSchema } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { newSheet } from '../../lib/new-sheet.js';
import type { LocalStore } from '../../lib/project-store/local-store.js';
import { SAMPLE_PISTON_DIAMETER_M, sampleFiles } from '../../lib/sample-driver.js';
import { addCard } from './sheet-edits.js';

const SAMPLE_CALCULATOR = 'driver-fit';

/** The sheet of `/try`: the one that is there, or a new one; with the sample drawn where that was asked for. */
export async function openTrySheet(store: LocalStore, withSample: boolean): Promise<string> {
  const sheets = await store.sheets.list();
  const newest = sheets.sort((a, b) => b.updatedAt.localeCompare(a.updatedAt))[0];
  if (withSample && (await store.sweeps.list()).length === 0) return addSample(store);
  return newest?.id ?? (await store.sheets.add(newSheet([], text.sheet.trySheetName))).id;
}

async function addSample(store: LocalStore): Promise<string> {
  const batchId = crypto.randomUUID();
  const candidates: Candidate[] = [];
  for (const { file, addedMassKg } of sampleFiles()) {
    const conditions = addedMassKg === undefined ? { role: 'free-air' } : { role: 'added-mass', addedMassKg };
    const name = file.name.replace(/\.[a-z]+$/, '');
    const row = await store.addSweep(
      { file, fileName: file.name },
      CreateSweepSchema.parse({ name, batchId, conditions }),
    );
    candidates.push({ sweepId: row.id, itemId: null, conditions: row.conditions });
  }
  const sheet = newSheet(
    candidates.map(({ sweepId }) => sweepId),
    text.common.sampleName,
  );
  const definition = calculatorById(SAMPLE_CALCULATOR);
  if (!definition) return (await store.sheets.add(sheet)).id;
  const inputs = Object.fromEntries(
    Object.entries(assignRoles(definition, candidates).roles).map(([role, list]) => [
      role,
      list.map(({ sweepId }) => ({ sweepId, keys: {} })),
    ]),
  );
  const card = {
    ...{ id: crypto.randomUUID(), calculatorId: definition.id, inputs, setupVersionId: null, resultId: null },
    settings: { pistonDiameter: SAMPLE_PISTON_DIAMETER_M },
  };
  const content = addCard(card)(SheetContentSchema.parse(sheet.content));
  return (await store.sheets.add({ ...sheet, content })).id;
}
