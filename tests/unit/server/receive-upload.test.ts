import { Readable } from 'node:stream';
import { expect, it } from 'vitest';
import { inChunks } from '../../../server/files/file-store.js';
import { cleanFileName } from '../../../server/sources/receive-upload.js';

it('keeps a file name as the person knows it, without folders and control characters', () => {
  expect(cleanFileName('C:\\bench\\Tieftöner 3 Ω.txt')).toBe('Tieftöner 3 Ω.txt');
  expect(cleanFileName('../../etc/passwd')).toBe('passwd');
  expect(cleanFileName('a\u0000b\r\n.csv')).toBe('ab.csv');
  expect(cleanFileName('/')).toBe('unnamed');
  expect([...cleanFileName('µ'.repeat(400))]).toHaveLength(200);
});

it.each([
  [[], []],
  [[3], [3]],
  [[4], [4]],
  [
    [1, 2, 3, 4],
    [4, 4, 2],
  ],
  [[9], [4, 4, 1]],
])('cuts pieces of %j bytes into chunks of %j', async (pieces, expected) => {
  const all = pieces.map((size, i) => Buffer.alloc(size, i + 1));
  const chunks: Buffer[] = [];
  for await (const chunk of inChunks(Readable.from(all), 4)) chunks.push(chunk);
  expect(chunks.map((chunk) => chunk.length)).toEqual(expected);
  expect(Buffer.concat(chunks)).toEqual(Buffer.concat(all));
});
