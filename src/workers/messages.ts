import type { RoleInputs } from '../../calculators/kit/calculator.js';
import type { Reading, ReadingOverrides } from '../../shared/contracts/reading.js';
import type { InputErrorCode } from '../../shared/errors.js';
import type { Finding, Output } from '../../shared/output.js';
import type { Points } from '../../shared/points.js';

/** An InputError as data: a worker's errors lose their class on the way. */
export interface Refusal {
  readonly code: InputErrorCode;
  readonly message: string;
  readonly where: string;
}
export type Answer<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly refusal: Refusal };

export interface ReadRequest {
  readonly file: Blob; // opened inside the worker, so that its bytes never pass through the page
  readonly fileName: string;
  readonly overrides: ReadingOverrides;
}
/** A file as read in the browser: what the server will find when it reads it again. */
export interface ReadFile {
  readonly sourceSha256: string;
  readonly reading: Reading;
  readonly findings: Finding[];
  readonly points: Points;
  readonly pointsSha256: string;
}
export type ReadAnswer = Answer<ReadFile> & { readonly lines: readonly string[] }; // the first lines, for the preview

export interface CalculateRequest {
  readonly calculatorId: string;
  readonly inputs: RoleInputs;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly settingsVersion?: number;
  readonly seed?: number;
}
export type CalculateAnswer = Answer<Output>;
export type OnProgress = (done: number, total: number, label?: string) => void;
