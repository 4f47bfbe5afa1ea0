import { type DragEvent, useRef, useState } from 'react';

const MOST_FILES = 500;

function entryFile(entry: FileSystemFileEntry): Promise<File> {
  return new Promise((resolve, reject) => entry.file(resolve, reject));
}

/** A folder answers its entries in portions: ask until a portion is empty. */
async function folderEntries(folder: FileSystemDirectoryEntry): Promise<FileSystemEntry[]> {
  const reader = folder.createReader();
  const entries: FileSystemEntry[] = [];
  for (;;) {
    const portion = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject));
    if (portion.length === 0) return entries;
    entries.push(...portion);
  }
}

async function filesBelow(entry: FileSystemEntry): Promise<File[]> {
  if (entry.isFile) return [await entryFile(entry as FileSystemFileEntry)];
  const files: File[] = [];
  for (const inner of await folderEntries(entry as FileSystemDirectoryEntry)) {
    if (files.length >= MOST_FILES) break;
    if (!inner.name.startsWith('.')) files.push(...(await filesBelow(inner)));
  }
  return files;
}

/** Every file of a drop, folders opened. The entries must be asked for before the event ends. */
export async function droppedFiles(transfer: DataTransfer): Promise<File[]> {
  const entries = [...transfer.items].filter((item) => item.kind === 'file').map((item) => item.webkitGetAsEntry());
  const known = entries.filter((entry) => entry !== null);
  if (known.length === 0) return [...transfer.files];
  return (await Promise.all(known.map(filesBelow))).flat().slice(0, MOST_FILES);
}

/** Drag handlers for a drop target, and whether files hover over it now. */
export function useFileDrop(onFiles: (files: File[]) => void) {
  const [isOver, setIsOver] = useState(false);
  const depth = useRef(0); // enter and leave also fire for every child
  const bringsFiles = (event: DragEvent) => event.dataTransfer.types.includes('Files');
  const shift = (by: number) => {
    depth.current = Math.max(0, depth.current + by);
    setIsOver(depth.current > 0);
  };
  const handlers = {
    onDragEnter: (event: DragEvent) => bringsFiles(event) && shift(1),
    onDragLeave: (event: DragEvent) => bringsFiles(event) && shift(-1),
    onDragOver: (event: DragEvent) => bringsFiles(event) && event.preventDefault(),
    onDrop: (event: DragEvent) => {
      if (!bringsFiles(event)) return;
      event.preventDefault();
      event.stopPropagation();
      depth.current = 0;
      setIsOver(false);
      void droppedFiles(event.dataTransfer).then(onFiles);
    },
  };
  return { isOver, handlers };
}
