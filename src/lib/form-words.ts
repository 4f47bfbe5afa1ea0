import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { text } from '../../shared/text.js';
import { ApiError } from './api-error.js';
import { errorWords } from './error-words.js';

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
