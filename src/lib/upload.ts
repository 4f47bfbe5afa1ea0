import { ownError } from './api-error.js';
import { problemToError } from './problem-to-error.js';

export interface UploadOptions {
  signal?: AbortSignal;
  /** Share of the bytes that have left, 0 to 1. */
  onProgress?: (share: number) => void;
}

function jsonOrUndefined(body: string): unknown {
  try {
    return JSON.parse(body);
  } catch {
    return undefined;
  }
}

/**
 * Posts a form with progress, which fetch cannot tell; resolves with the parsed JSON of a 2xx answer. An abort counts
 * while bytes are still leaving; after that the outcome is the server's, and comes as its answer.
 */
export function sendForm(url: string, form: FormData, { signal, onProgress }: UploadOptions): Promise<unknown> {
  return new Promise((resolve, reject) => {
    if (signal?.aborted) {
      reject(ownError('stopped'));
      return;
    }
    const request = new XMLHttpRequest();
    let isSent = false;
    const stop = () => {
      if (!isSent) request.abort(); // the server has it all already: its answer says what was stored
    };
    request.open('POST', url);
    request.setRequestHeader('accept', 'application/json');
    request.upload.onprogress = ({ loaded, total }) => onProgress?.(total > 0 ? loaded / total : 0);
    request.upload.onload = () => {
      isSent = true;
    };
    request.onload = () => {
      const body = jsonOrUndefined(request.responseText);
      if (request.status >= 200 && request.status < 300) resolve(body);
      else reject(problemToError(request.status, body));
    };
    request.onerror = () => reject(ownError('offline'));
    request.onabort = () => reject(ownError('stopped'));
    request.onloadend = () => signal?.removeEventListener('abort', stop);
    signal?.addEventListener('abort', stop, { once: true });
    request.send(form);
  });
}
