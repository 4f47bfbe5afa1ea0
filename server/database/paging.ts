import type { ObjectLiteral, SelectQueryBuilder } from 'typeorm';
import { z } from 'zod';
import type { Page, PageQuery } from '../../shared/contracts/paging.js';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

const CursorSchema = z.tuple([z.iso.datetime(), z.uuid()]);

/**
 * One page of rows that have an id and a time of making, in that order; the cursor is the place of the last row, so
 * that rows made or deleted meanwhile neither repeat nor hide others.
 */
export async function pageOfRows<Row extends ObjectLiteral & { id: string; createdAt: Date }>(
  rows: SelectQueryBuilder<Row>,
  { cursor, limit }: PageQuery,
  order: 'newest-first' | 'oldest-first' = 'oldest-first',
): Promise<Page<Row>> {
  const alias = rows.alias;
  const direction = order === 'oldest-first' ? 'ASC' : 'DESC';
  const comparison = order === 'oldest-first' ? '>' : '<';
  if (cursor !== undefined) {
    const [cursorTime, cursorId] = decodeCursor(cursor);
    const beyond = `(${alias}.createdAt, ${alias}.id) ${comparison} (:cursorTime, :cursorId)`;
    rows.andWhere(beyond, { cursorTime, cursorId });
  }
  rows
    .orderBy(`${alias}.createdAt`, direction)
    .addOrderBy(`${alias}.id`, direction)
    .limit(limit + 1);
  const found = await rows.getMany();
  const items = found.slice(0, limit);
  const last = items.at(-1);
  return { items, next: found.length > limit && last ? encodeCursor(last.createdAt, last.id) : null };
}

/** A place in a list that is ordered by a time and, where times are equal, by id. */
export function encodeCursor(time: Date, id: string): string {
  return Buffer.from(JSON.stringify([time.toISOString(), id])).toString('base64url');
}

export function decodeCursor(cursor: string): [time: string, id: string] {
  try {
    return CursorSchema.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
  } catch (cause) {
    throw new AppError('validation-failed', text.server.cursorUnknown, {}, cause);
  }
}
