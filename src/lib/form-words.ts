import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import type { z } from 'zod';
import { text } from '../../shared/text.js';
import { ApiError } from './api-error.js';
import { errorWords } from './error-words.js';

const { fields } = text.account;

/** Our words for what a schema found, for zod's `error` option; undefined leaves the schema's own sentence. */
export const schemaWords: z.core.$ZodErrorMap = (issue) => {
  if (issue.code === 'invalid_format' && issue.format === 'email')
    return issue.input === '' ? fields.missing : fields.email;
  if (issue.code === 'too_small' && issue.origin === 'string') {
    return issue.input === '' || issue.minimum === 1 ? fields.missing : fields.tooShort(Number(issue.minimum));
  }
  if (issue.code === 'too_big' && issue.origin === 'string') return fields.tooLong(Number(issue.maximum));
  if (issue.code === 'invalid_type') return fields.missing;
  return undefined;
};

/** For the second place of `.then(onSaved, showServerErrors(form))`: each sentence on its field, the rest on top. */
export function showServerErrors<Values extends FieldValues>(form: UseFormReturn<Values>) {
  return (error: unknown) => {
    const known = form.getValues();
    const issues = error instanceof ApiError ? error.issues : [];
    const own = issues.filter(({ path }) => path in known);
    for (const { path, message } of own) form.setError(path as Path<Values>, { message });
    if (own.length > 0) return;
    const { title, detail, requestId } = errorWords(error);
    const reference = requestId ? ` ${text.common.reference(requestId)}` : '';
    form.setError('root', { message: `${title}. ${detail}${reference}` });
  };
}
