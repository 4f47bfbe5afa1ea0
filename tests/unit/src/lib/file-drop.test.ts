import { expect, it } from 'vitest';
import { droppedFiles } from '../../../../src/lib/file-drop.js';

type Entry = FileSystemFileEntry | FileSystemDirectoryEntry;
const file = (name: string) =>
  ({ isFile: true, name, file: (found: (file: File) => void) => found(new File(['x'], name)) }) as Entry;
/** A folder that answers its entries in portions of two, as browsers answer them in portions of a hundred. */
const folder = (name: string, entries: Entry[]) => {
  const left = [...entries];
  const readEntries = (found: (portion: Entry[]) => void) => found(left.splice(0, 2));
  return { isFile: false, name, createReader: () => ({ readEntries }) } as unknown as Entry;
};
const dropOf = (...entries: Entry[]) =>
  ({
    items: entries.map((entry) => ({ kind: 'file', webkitGetAsEntry: () => entry })),
    files: [],
  }) as unknown as DataTransfer;
const names = async (drop: DataTransfer) => (await droppedFiles(drop)).map(({ name }) => name);

it('opens folders, however many portions they answer in', async () => {
  const inner = folder('lot', ['a', 'b', 'c', 'd', 'e'].map(file));
  expect(await names(dropOf(file('one'), folder('sweeps', [file('two'), inner])))).toEqual([
    'one',
    'two',
    'a',
    'b',
    'c',
    'd',
    'e',
  ]);
});

it('leaves out hidden files of a folder', async () => {
  expect(await names(dropOf(folder('sweeps', [file('.DS_Store'), file('a.csv')])))).toEqual(['a.csv']);
});
