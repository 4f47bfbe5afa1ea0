import { createHash } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import { CreateItemSchema, type Item } from '../../shared/contracts/item.js';
import { CreateSweepSchema, type SweepRow } from '../../shared/contracts/sweep.js';
import { PostgresFileStore } from '../files/postgres-file-store.js';
import { ItemService } from '../items/service.js';
import { Access } from '../permissions/access.js';
import type { Actor } from '../permissions/actor.js';
import { ProjectService } from '../projects/service.js';
import { ReadingPool } from '../reading/reading-pool.js';
import { SheetService } from '../sheets/service.js';
import { SourceService } from '../sources/service.js';
import { makeTemporaryFolder } from '../sources/temporary-folder.js';
import { loadedSweeps, toSweep } from '../sweeps/sweep-rows.js';
import { demoSheets } from './demo-sheets.js';
import { type DemoSweep, demoSweeps } from './demo-sweeps.js';

export const PROJECT_NAME = 'Rehearsal-room monitors';
const PROJECT_NOTE =
  'Invented data, made from models. The music department builds eight monitors for its rehearsal rooms: sixteen ' +
  'mid-woofers to match, eight cabinets to check, a radiator box to tune, and a drawer of damp crossover parts.';
const PAGE = { limit: 500 };

/** The project with everything on it, through the same services that a person's browser reaches. */
export async function fillBench(dataSource: DataSource, actors: readonly Actor[], teamId: string) {
  const [owner, lead, member] = actors as [Actor, Actor, Actor];
  const access = new Access(dataSource);
  const reader = new ReadingPool();
  const folder = makeTemporaryFolder();
  try {
    const projectId = await demoProject(dataSource, access, owner, teamId);
    const sources = new SourceService(dataSource, access, new PostgresFileStore(dataSource), reader);
    const items = await itemsByName(new ItemService(dataSource, access), member, projectId);
    const sweeps = await sweepsByName(dataSource, projectId);
    for (const demo of demoSweeps()) {
      if (sweeps.has(demo.name)) continue;
      const itemId = (await items.of(demo)).id;
      const file = await fileOf(demo, folder.path);
      sweeps.set(demo.name, await sources.add(member, projectId, file, told(demo, itemId)));
    }
    const sheets = new SheetService(dataSource, access);
    const known = new Set((await sheets.list(lead, projectId, PAGE)).items.map(({ name }) => name));
    const missing = demoSheets(sweeps).filter(({ name }) => !known.has(name));
    for (const sheet of missing) await sheets.create(lead, projectId, sheet);
    return { sweeps: sweeps.size, sheets: known.size + missing.length };
  } finally {
    await reader.close();
    folder.remove();
  }
}

async function demoProject(dataSource: DataSource, access: Access, owner: Actor, teamId: string): Promise<string> {
  const projects = new ProjectService(dataSource, access);
  const known = (await projects.list(owner, teamId, PAGE)).items.find(({ name }) => name === PROJECT_NAME);
  const { id } = known ?? (await projects.create(owner, teamId, { name: PROJECT_NAME, note: PROJECT_NOTE }));
  await dataSource.query('UPDATE project SET is_invented = true WHERE id = $1', [id]); // nothing a person can ask for
  return id;
}

async function itemsByName(items: ItemService, actor: Actor, projectId: string) {
  const known = new Map<string, Item>();
  for (const item of (await items.list(actor, projectId, PAGE)).items) known.set(item.name, item);
  return {
    async of({ item }: DemoSweep): Promise<Item> {
      const found = known.get(item.name) ?? (await items.create(actor, projectId, CreateItemSchema.parse(item)));
      known.set(found.name, found);
      return found;
    },
  };
}

async function sweepsByName(dataSource: DataSource, projectId: string): Promise<Map<string, SweepRow>> {
  const rows = await loadedSweeps(dataSource.manager).where('s.projectId = :projectId', { projectId }).getMany();
  return new Map(rows.map((row) => [row.name, toSweep(row)]));
}

async function fileOf({ fileName, content }: DemoSweep, folder: string) {
  const path = join(folder, 'demo');
  await writeFile(path, content);
  const sha256 = createHash('sha256').update(content).digest('hex');
  return { path, fileName, bytes: Buffer.byteLength(content), sha256 };
}

function told({ name, conditions, group, tags }: DemoSweep, itemId: string) {
  return CreateSweepSchema.parse({ name, conditions, group, tags, itemId, batchId: batchOf(group) });
}

/** One drop of files for each group, the same id however often the seed has to begin. */
function batchOf(group: string): string {
  const hex = createHash('sha256').update(`demo ${group}`).digest('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), `4${hex.slice(13, 16)}`, `8${hex.slice(17, 20)}`, hex.slice(20, 32)].join(
    '-',
  );
}
