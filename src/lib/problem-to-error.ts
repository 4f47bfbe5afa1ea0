import { ProblemSchema } from '../../shared/contracts/problem.js';
import { text } from '../../shared/text.js';
import { ApiError } from './api-error.js';

/** The error that an answer other than 2xx stands for. `body` is the parsed JSON, whatever it is. */
export function problemToError(status: number, body: unknown): ApiError {
  const parsed = ProblemSchema.safeParse(body);
  if (!parsed.success) return new ApiError('odd-answer', text.errors.oddAnswerDetail, status);
  const { code, detail, requestId, issues, extra } = parsed.data;
  return new ApiError(code, detail, status, requestId, issues, extra);
}
