import type { Problem } from '../../shared/contracts/problem.js';
import { INPUT_ERROR_CODES, InputError, type InputErrorCode } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

type OwnCode = 'offline' | 'odd-answer' | 'stopped';

/** A refused or failed request: the problem details of the server, or what the page itself met on the way. */
export class ApiError extends Error {
  override readonly name = 'ApiError';
  constructor(
    readonly code: string,
    message: string,
    readonly status: number = 0,
    readonly requestId: string = '',
    readonly issues: NonNullable<Problem['issues']> = [],
    readonly extra: Record<string, unknown> = {},
    cause?: unknown,
  ) {
    super(message, { cause });
  }

  /** In two or three words, for a heading. */
  get title(): string {
    const titles: Record<string, string> = text.errors.titles;
    return titles[this.code] ?? text.errors.titles['internal-error'];
  }

  /** What a refused file was refused for, where the answer carries it. */
  get inputError(): InputError | undefined {
    const { code, message, where } = (this.extra.inputError ?? this.extra) as Record<string, unknown>;
    if (!isInputErrorCode(code) || typeof message !== 'string') return undefined;
    return new InputError(code, message, typeof where === 'string' ? where : '');
  }
}

export function isInputErrorCode(code: unknown): code is InputErrorCode {
  return (INPUT_ERROR_CODES as readonly unknown[]).includes(code);
}

const OWN_DETAIL: Record<OwnCode, string> = {
  offline: text.errors.offlineDetail,
  'odd-answer': text.errors.oddAnswerDetail,
  stopped: text.errors.stoppedDetail,
};
export function ownError(code: OwnCode, cause?: unknown): ApiError {
  return new ApiError(code, OWN_DETAIL[code], 0, '', [], {}, cause);
}
