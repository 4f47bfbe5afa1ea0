import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Dialog } from '../../components/dialog.js';
import type { Clash } from './use-sheet-content.js';

const words = text.sheet.conflict;

/** Two people changed the same part of a sheet: both are named, and the person decides. */
export function ClashDialog({ clash, onSettle }: { clash: Clash; onSettle: (whose: 'mine' | 'theirs') => void }) {
  const fields = clash.fields.map((field) => words.fields[field]).join(', ');
  return (
    <Dialog
      title={words.title}
      isHeld
      onClose={() => {}}
      actions={
        <>
          <Button onClick={() => onSettle('theirs')}>{words.theirs}</Button>
          <Button look="primary" onClick={() => onSettle('mine')}>
            {words.mine}
          </Button>
        </>
      }
    >
      <p>{words.body(fields)}</p>
    </Dialog>
  );
}
