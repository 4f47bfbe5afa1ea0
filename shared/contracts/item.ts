import { z } from 'zod';
import { PageQuerySchema, pageOf, rowShape } from './paging.js';

/** The thing measured. Published figures are kept as they are printed, in SI, with an optional tolerance (fraction). */
export const ITEM_KINDS = ['driver', 'box', 'part', 'jig'] as const;
export const ItemKindSchema = z.enum(ITEM_KINDS);
export const PublishedFigureSchema = z.strictObject({
  value: z.number(),
  unit: z.string(),
  tolerance: z.number().positive().optional(),
});
const itemShape = {
  kind: ItemKindSchema,
  name: z.string().trim().min(1).max(80),
  serial: z.string().trim().max(80).default(''),
  note: z.string().trim().max(2000).default(''),
  published: z.record(z.string().max(40), PublishedFigureSchema).default({}),
};
export const CreateItemSchema = z.strictObject(itemShape);
export type CreateItem = z.infer<typeof CreateItemSchema>;
export const UpdateItemSchema = z.strictObject({
  name: itemShape.name.optional(),
  serial: z.string().trim().max(80).optional(),
  note: z.string().trim().max(2000).optional(),
  published: z.record(z.string().max(40), PublishedFigureSchema).optional(),
});
export type UpdateItem = z.infer<typeof UpdateItemSchema>;
export const ItemSchema = z.object({ ...rowShape, ...itemShape, projectId: z.uuid() });
export type Item = z.infer<typeof ItemSchema>;
export const ItemPageSchema = pageOf(ItemSchema);
export const ItemQuerySchema = PageQuerySchema.extend({ kind: ItemKindSchema.optional() });
export type ItemQuery = z.infer<typeof ItemQuerySchema>;
