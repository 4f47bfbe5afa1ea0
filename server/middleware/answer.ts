import type { Response } from 'express';
import type { z } from 'zod';

/**
 * Sends a value in the shape of its contract. A mismatch is a fault of the server and answers 500; it is never blamed
 * on the request.
 */
export function answer<Schema extends z.ZodType>(
  response: Response,
  schema: Schema,
  value: z.input<Schema>,
  status = 200,
): void {
  const parsed = schema.safeParse(value);
  if (!parsed.success) throw new Error('An answer does not fit its contract.', { cause: parsed.error });
  response.status(status).json(parsed.data);
}
