import { z } from 'zod';

/** Lists page by cursor: ask again with `cursor=next` until `next` is null. */
export const PageQuerySchema = z.object({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(500).default(100),
});
export type PageQuery = z.infer<typeof PageQuerySchema>;

export function pageOf<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), next: z.string().nullable() });
}
export interface Page<Item> {
  items: Item[];
  next: string | null;
}

/** What every editable row carries; an edit sends `If-Match: "<version>"`. */
export const rowShape = {
  id: z.uuid(),
  version: z.int().positive(),
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
  deletedAt: z.iso.datetime().nullable(),
};
