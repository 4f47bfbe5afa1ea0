import type { Reading, ReadingOverrides } from '../../shared/contracts/reading.js';
import type { InputErrorCode } from '../../shared/errors.js';
import type { Finding } from '../../shared/output.js';

/** What the reading thread is asked: a file on this machine's disk, and what a person said about it. */
export interface ReadRequest {
  readonly path: string;
  readonly fileName: string;
  readonly overrides: ReadingOverrides;
}

/** A file as read: its canonical points with their hash, ready for a revision. */
export interface ReadFile {
  readonly reading: Reading;
  readonly findings: Finding[];
  readonly hasPhase: boolean;
  readonly points: number;
  readonly minFrequencyHz: number;
  readonly maxFrequencyHz: number;
  readonly pointsSha256: string;
  readonly canonicalPoints: Uint8Array<ArrayBuffer>;
}

export type ReadReply =
  | { readonly ok: true; readonly read: ReadFile }
  | { readonly ok: false; readonly refusal: { code: InputErrorCode; message: string; where: string } }
  | { readonly ok: false; readonly crash: string };
