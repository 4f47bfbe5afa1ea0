import { type EntityManager, In, IsNull } from 'typeorm';
import type { SweepConditions } from '../../shared/contracts/sweep.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { ItemEntity } from '../database/entities/item.entity.js';

interface NamesItems {
  readonly itemId?: string | null | undefined;
  readonly conditions?: SweepConditions | undefined;
}

/** Items that a sweep names, as its own or as its jig, have to stand in the sweep's project and not in the bin. */
export async function requireNamedItems(manager: EntityManager, projectId: string, sweep: NamesItems): Promise<void> {
  const named = new Map<string, string>();
  if (sweep.itemId) named.set('itemId', sweep.itemId);
  if (sweep.conditions?.jigItemId) named.set('conditions.jigItemId', sweep.conditions.jigItemId);
  if (named.size === 0) return;
  const where = { id: In([...named.values()]), projectId, deletedAt: IsNull() };
  const found = new Set((await manager.find(ItemEntity, { where, select: { id: true } })).map((item) => item.id));
  const issues = [...named]
    .filter(([, id]) => !found.has(id))
    .map(([path]) => ({ path, message: text.measurements.itemNotHere }));
  if (issues.length > 0) throw new AppError('validation-failed', text.measurements.itemNotHere, { issues });
}
