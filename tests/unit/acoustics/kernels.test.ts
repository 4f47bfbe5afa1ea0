import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect, it } from 'vitest';
import { kernelFiles } from '../../../scripts/make-kernels.mjs';

const folder = new URL('../../../calculators/acoustics/kernels/', import.meta.url);

it('stand in the tree exactly as the script writes them', () => {
  const files = kernelFiles();
  expect(readdirSync(fileURLToPath(folder)).sort()).toEqual([...files.keys()].sort());
  for (const [name, text] of files) expect(readFileSync(new URL(name, folder), 'utf8')).toBe(text);
});
