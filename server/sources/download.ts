import type { Request } from 'express';
import type { SourceFile } from '../../shared/contracts/sweep.js';

/** Headers of a source file: saved byte for byte, never shown or guessed at by a browser. */
export function attachment({ fileName, bytes, sha256 }: Pick<SourceFile, 'fileName' | 'bytes' | 'sha256'>) {
  return {
    'Content-Type': 'application/octet-stream',
    'Content-Length': String(bytes),
    'Content-Disposition': dispositionOf(fileName),
    'X-Content-Type-Options': 'nosniff',
    ...neverChanges(sha256),
  };
}

/** The content under this address is named by its hash, so a browser may keep it; only for this person. */
export function neverChanges(sha256: string) {
  return { ETag: `"${sha256}"`, 'Cache-Control': 'private, max-age=31536000, immutable, no-transform' };
}

export function isKnownTag(request: Request, sha256: string): boolean {
  const tags = request.get('if-none-match')?.split(',') ?? [];
  return tags.some((tag) => [`"${sha256}"`, `W/"${sha256}"`, '*'].includes(tag.trim()));
}

/** RFC 6266: a plain name for old readers, the true one in UTF-8. */
function dispositionOf(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, '_');
  const encoded = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (letter) => `%${letter.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}
