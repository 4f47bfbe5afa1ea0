import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { showToast } from '../../components/toast-store.js';
import { useDeleteRow, useRestoreRow } from '../../lib/project-store/store-mutations.js';
import { useSheetScene } from './sheet-context.js';
import { putAway } from './sheet-edits.js';

/** Puts a sweep into the bin and away from the sheet; Undo brings it back. */
export function useRemoveSweep(): (sweep: SweepRow) => void {
  const { state } = useSheetScene();
  const removal = useDeleteRow('sweeps');
  const restoring = useRestoreRow('sweeps');
  return (sweep) => {
    state.edit(putAway(sweep.id));
    removal.mutate(sweep, {
      onSuccess: () =>
        showToast({
          message: text.sheet.ledger.removed(sweep.name),
          action: { label: text.common.undo, run: () => restoring.mutate(sweep.id) },
        }),
    });
  };
}
