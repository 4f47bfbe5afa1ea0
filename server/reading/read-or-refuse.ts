import { AppError, InputError } from '../../shared/errors.js';
import type { ReadFile, ReadRequest } from './messages.js';
import type { ReadingPool } from './reading-pool.js';

/** Reads a file; one that cannot be used answers `file-refused`, with the reader's code, words and place. */
export async function readOrRefuse(pool: ReadingPool, request: ReadRequest): Promise<ReadFile> {
  try {
    return await pool.read(request);
  } catch (error) {
    if (error instanceof InputError) throw new AppError('file-refused', error.message, error.toJSON(), error);
    throw error;
  }
}
