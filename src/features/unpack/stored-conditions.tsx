import { useState } from 'react';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { TextField } from '../../components/text-field.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useUpdateRow } from '../../lib/project-store/store-mutations.js';
import { ConditionsForm } from './conditions-form.js';
import { ItemChoice } from './item-choice.js';
import { missingCondition, newEntry } from './unpack-entry.js';

/** Name, role, masses, volumes and item of a stored sweep. */
export function StoredConditions({ sweep }: { sweep: SweepRow }) {
  const store = useProjectStore();
  const update = useUpdateRow('sweeps');
  const [name, setName] = useState(sweep.name);
  const [conditions, setConditions] = useState(sweep.conditions);
  const [itemId, setItemId] = useState(sweep.itemId);
  const entry = { ...newEntry(new File([], name)), conditions };
  const isSame =
    name === sweep.name && itemId === sweep.itemId && JSON.stringify(conditions) === JSON.stringify(sweep.conditions);
  const reason =
    store.readOnlyReason ??
    (missingCondition(entry) || name.trim() === ''
      ? text.unpack.needed
      : isSame
        ? text.common.nothingChanged
        : undefined);
  const change = { name: name.trim(), conditions, itemId };
  return (
    <div className="flex max-w-md flex-col gap-4">
      <TextField
        label={text.unpack.name}
        value={name}
        maxLength={120}
        onChange={(event) => setName(event.target.value)}
      />
      <ConditionsForm conditions={conditions} onChange={setConditions} />
      <ItemChoice
        itemId={itemId}
        kind={conditions.role === 'box' || conditions.role === 'part' ? conditions.role : 'driver'}
        onChange={setItemId}
      />
      <Button
        look="primary"
        className="self-start"
        reason={reason}
        isBusy={update.isPending}
        onClick={() => update.mutate({ seen: sweep, change })}
      >
        {text.common.save}
      </Button>
      <p role="status" className="text-soft">
        {update.isSuccess && isSame && text.common.saved}
      </p>
      {update.isError && <ErrorBar error={update.error} />}
    </div>
  );
}
