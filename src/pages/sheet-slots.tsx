import { text } from '../../shared/text.js';
import { Dialog } from '../components/dialog.js';
import type { SheetSlots } from '../features/sheet/sheet-context.js';
import { ReadAgain } from '../features/unpack/read-again.js';
import { StoredConditions } from '../features/unpack/stored-conditions.js';
import { Unpack } from '../features/unpack/unpack.js';

/** What a sheet shows of Unpack: the same on a project's sheet and on the one of this browser. */
export const sheetSlots: SheetSlots = {
  unpack: ({ onAdded, onClose }) => (
    <Dialog title={text.unpack.title} onClose={onClose} isFull>
      <Unpack onAdded={({ sweeps }) => onAdded(sweeps.map(({ id }) => id))} />
    </Dialog>
  ),
  conditions: (sweep) => <StoredConditions key={sweep.version} sweep={sweep} />,
  readAgain: (sweep) => <ReadAgain key={sweep.revision.id} sweep={sweep} aside={(rule) => rule} />,
};
