/**
 * The two kinds of typed error. InputError: a file, a setting or an input that cannot be used, raised by the
 * calculators and readers, the same in the browser, on the server and on the command line. AppError: what an API
 * caller can act on, with its HTTP status. Codes are public: add codes, never rename one.
 */
export const INPUT_ERROR_CODES = [
  'empty-file',
  'not-text',
  'html-instead-of-data',
  'archive-instead-of-data',
  'no-numeric-data',
  'too-few-columns',
  'not-a-curve',
  'too-few-points',
  'single-frequency',
  'negative-frequency',
  'zero-impedance',
  'file-too-large',
  'wav-header-inconsistent',
  'wav-unsupported-encoding',
  'wav-not-stereo',
  'wav-empty',
  'wav-silent',
  'wav-clipped',
  'no-sweep-found',
  'touchstone-not-one-port',
  'touchstone-no-option-line',
  'touchstone-count-mismatch',
  'touchstone-unsupported',
  'missing-input',
  'bad-setting',
] as const;
export type InputErrorCode = (typeof INPUT_ERROR_CODES)[number];

/** `message` says what is wrong and what to do; `where` names the file, line, role or setting. */
export class InputError extends Error {
  override readonly name = 'InputError';
  constructor(
    readonly code: InputErrorCode,
    message: string,
    readonly where: string = '',
  ) {
    super(message);
  }
  toJSON(): { code: InputErrorCode; message: string; where: string } {
    return { code: this.code, message: this.message, where: this.where };
  }
}

export const ERROR_STATUS = {
  'validation-failed': 400,
  'file-refused': 422, // the detail carries the InputError
  'not-signed-in': 401,
  'sign-in-failed': 401,
  'session-ended': 401,
  'link-not-open': 410, // used, ended and unknown links answer alike
  'not-verified': 403,
  'password-needed': 403, // the link was opened in another browser than the one that registered
  'access-denied': 403,
  'cross-site': 403,
  'not-found': 404,
  'already-here': 409, // the same source file is in this project already
  'version-conflict': 409, // detail: both versions
  'version-missing': 428, // an edit has to name the version it started from: If-Match
  'name-taken': 409,
  'too-large': 413,
  'too-many-tries': 429,
  'not-ready': 503,
  'internal-error': 500,
} as const;
export type ErrorCode = keyof typeof ERROR_STATUS;

export class AppError extends Error {
  override readonly name = 'AppError';
  constructor(
    readonly code: ErrorCode,
    message: string,
    readonly detail: Record<string, unknown> = {},
    cause?: unknown,
  ) {
    super(message, { cause });
  }
}
