import { InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import { ApiError } from './api-error.js';
import { EditConflict } from './project-store/project-store.js';

export interface ErrorWords {
  title: string;
  detail: string;
  requestId: string;
  /** What helps whoever looks into it: copied, never shown. */
  technical: string;
}

/** Any thrown thing in words for the screen. */
export function errorWords(error: unknown): ErrorWords {
  const technical = error instanceof Error ? `${error.name}: ${error.message}\n${error.stack ?? ''}` : String(error);
  if (error instanceof ApiError) {
    const refused = error.inputError;
    return {
      title: refused ? text.errors.refusedFiles[refused.code] : error.title,
      detail: refused?.message ?? error.message,
      requestId: error.requestId,
      technical: `${error.code} ${error.status}\n${technical}`,
    };
  }
  if (error instanceof EditConflict) {
    const theirs = error.fields.map((field) => String((error.theirs as Record<string, unknown>)[field]));
    const detail = text.errors.editedTwice(theirs.join(', '));
    return { title: text.errors.titles['version-conflict'], detail, requestId: '', technical };
  }
  if (error instanceof InputError) {
    return { title: text.errors.refusedFiles[error.code], detail: error.message, requestId: '', technical };
  }
  if (error instanceof DOMException && error.name === 'QuotaExceededError') {
    return { title: text.errors.unknownTitle, detail: text.errors.storageDetail, requestId: '', technical };
  }
  return { title: text.errors.unknownTitle, detail: text.errors.unknownDetail, requestId: '', technical };
}
