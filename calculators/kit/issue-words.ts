import type { z } from 'zod';

/** A schema's complaint in words for a person: what was expected, without the schema's preface. */
export function issueWords(issue: z.core.$ZodIssue | undefined): string {
  return issue?.message.replace(/^(Invalid [\w ]+|Too (big|small)): /, '') ?? 'it does not fit';
}
