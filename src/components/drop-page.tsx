import { type ReactNode, useEffect } from 'react';
import { text } from '../../shared/text.js';
import { droppedFiles, useFileDrop } from '../lib/file-drop.js';

interface DropPageProps {
  onFiles: (files: File[]) => void;
  /** Nothing can be added here now; drops are then ignored, never opened by the browser. */
  isOff?: boolean;
  children: ReactNode;
}

/** A whole screen that takes files: dropped anywhere, or pasted anywhere outside a field. */
export function DropPage({ onFiles, isOff, children }: DropPageProps) {
  const take = (files: File[]) => {
    if (!isOff && files.length > 0) onFiles(files);
  };
  const { isOver, handlers } = useFileDrop(take);
  useEffect(() => {
    const paste = (event: ClipboardEvent) => {
      const isField = event.target instanceof Element && event.target.closest('input, textarea, [contenteditable]');
      if (isField || !event.clipboardData || isOff) return;
      void pastedFiles(event.clipboardData).then((files) => files.length > 0 && onFiles(files));
    };
    document.addEventListener('paste', paste);
    return () => document.removeEventListener('paste', paste);
  }, [onFiles, isOff]);
  return (
    <div {...handlers} className="contents">
      {children}
      {isOver && !isOff && (
        <div className="pointer-events-none fixed inset-3 z-50 flex items-center justify-center rounded-sheet border-2 border-dashed border-heather bg-heather-wash/80">
          <p className="rounded-control bg-raised px-4 py-2 text-title">{text.common.letGo}</p>
        </div>
      )}
    </div>
  );
}

/** Files on the clipboard, or its text as a file. */
async function pastedFiles(data: DataTransfer): Promise<File[]> {
  const written = data.getData('text/plain');
  if (data.files.length > 0) return droppedFiles(data);
  return written.trim() === '' ? [] : [textAsFile(written)];
}

export function textAsFile(written: string): File {
  return new File([written], text.unpack.pastedName, { type: 'text/plain' });
}
