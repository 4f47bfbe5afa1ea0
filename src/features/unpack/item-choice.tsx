import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Select } from '../../components/select.js';
import { TextField } from '../../components/text-field.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useAddRow } from '../../lib/project-store/store-mutations.js';
import { itemsQuery } from '../../lib/project-store/store-queries.js';

const NEW = 'new';
interface ItemChoiceProps {
  itemId: string | null;
  /** What a new item most likely is. */
  kind: 'driver' | 'box' | 'part';
  onChange: (itemId: string | null) => void;
}

/** Which driver, box or part was measured; a new one is made here by its name alone. */
export function ItemChoice({ itemId, kind, onChange }: ItemChoiceProps) {
  const store = useProjectStore();
  const { data: items = [] } = useQuery(itemsQuery(store));
  const add = useAddRow('items');
  const [newName, setNewName] = useState<string>();
  const make = async () => {
    if (!newName?.trim()) return;
    const item = await add.mutateAsync({ kind, name: newName.trim(), serial: '', note: '', published: {} });
    setNewName(undefined);
    onChange(item.id);
  };
  const options = [
    { value: '', label: text.unpack.noItem },
    ...items.map(({ id, name }) => ({ value: id, label: name })),
    { value: NEW, label: text.unpack.newItem },
  ];
  return (
    <div className="flex flex-col gap-2">
      <Select
        label={text.unpack.item}
        isOptional
        options={options}
        value={newName === undefined ? (itemId ?? '') : NEW}
        onValue={(value) => {
          setNewName(value === NEW ? '' : undefined);
          if (value !== NEW) onChange(value || null);
        }}
      />
      {newName !== undefined && (
        <div className="flex items-end gap-2">
          <TextField
            label={text.unpack.newItemName}
            className="flex-1"
            value={newName}
            maxLength={80}
            onChange={(event) => setNewName(event.target.value)}
            onKeyDown={(event) => event.key === 'Enter' && void make().catch(() => {})}
          />
          <Button isBusy={add.isPending} onClick={() => void make().catch(() => {})}>
            {text.unpack.makeItem}
          </Button>
        </div>
      )}
      {add.isError && <ErrorBar error={add.error} />}
    </div>
  );
}
