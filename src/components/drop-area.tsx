import { FolderOpen } from 'lucide-react';
import { type ReactNode, useId, useRef } from 'react';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { useFileDrop } from '../lib/file-drop.js';
import { Button } from './button.js';

interface DropAreaProps {
  onFiles: (files: File[]) => void;
  /** The name of the file field, for people who do not drag. */
  label: string;
  children?: ReactNode;
  className?: string;
}

/** A place to drop files or folders, with "Choose files" for everyone who does not drag. */
export function DropArea({ onFiles, label, children, className }: DropAreaProps) {
  const { isOver, handlers } = useFileDrop(onFiles);
  return (
    <div
      {...handlers}
      className={classNames(
        'flex flex-col items-center justify-center gap-3 rounded-sheet border-2 border-dashed p-6 text-center',
        'transition-colors duration-120',
        isOver ? 'border-heather bg-heather-wash' : 'border-edge bg-sheet',
        className,
      )}
    >
      {children}
      <ChooseFiles label={label} onFiles={onFiles} />
      <p aria-hidden className="text-note text-soft">
        {isOver ? text.common.letGo : text.common.dropHere}
      </p>
    </div>
  );
}

/** The button and the file field behind it; the field itself stays reachable by its label. */
interface ChooseFilesProps {
  label: string;
  onFiles: (files: File[]) => void;
  /** Beside other things, not the page's main action. */
  isQuiet?: boolean;
}
export function ChooseFiles({ label, onFiles, isQuiet }: ChooseFilesProps) {
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  return (
    <>
      <input
        ref={input}
        id={id}
        type="file"
        multiple
        aria-label={label}
        tabIndex={-1}
        className="sr-only"
        onChange={(event) => {
          onFiles([...(event.target.files ?? [])]);
          event.target.value = ''; // the same file can be chosen again
        }}
      />
      <Button
        look={isQuiet ? 'plain' : 'primary'}
        icon={<FolderOpen size={18} aria-hidden />}
        onClick={() => input.current?.click()}
      >
        {text.common.chooseFiles}
      </Button>
    </>
  );
}
