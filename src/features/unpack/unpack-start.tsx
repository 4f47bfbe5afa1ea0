import { useState } from 'react';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { DropArea } from '../../components/drop-area.js';
import { textAsFile } from '../../components/drop-page.js';
import { TextArea } from '../../components/text-field.js';

/** Nothing dropped yet: the drop area, and a place to paste a table. */
export function UnpackStart({ onFiles }: { onFiles: (files: File[]) => void }) {
  const [written, setWritten] = useState('');
  const add = () => {
    if (written.trim() !== '') onFiles([textAsFile(written)]);
    setWritten('');
  };
  return (
    <div className="mx-auto flex max-w-3xl flex-col gap-6">
      <DropArea label={text.unpack.chooseLabel} onFiles={onFiles} className="min-h-56">
        <p className="max-w-prose text-read">{text.unpack.intro}</p>
      </DropArea>
      <div className="flex flex-col items-start gap-2">
        <TextArea
          label={text.unpack.pasteLabel}
          hint={text.unpack.pasteHint}
          className="w-full"
          spellCheck={false}
          value={written}
          onChange={(event) => setWritten(event.target.value)}
        />
        <Button onClick={add}>{text.unpack.pasteAdd}</Button>
      </div>
    </div>
  );
}
