import { QueryFailedError } from 'typeorm';

/** Whether the database refused a second row of the same key: the rule that settles a race between two writers. */
export function violates(error: unknown, constraint: string): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  const { code, constraint: name } = error.driverError as { code?: string; constraint?: string };
  return code === '23505' && name === constraint;
}
