import { X } from 'lucide-react';
import { useState } from 'react';
import type { Item } from '../../../shared/contracts/item.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { NumberField } from '../../components/number-field.js';
import { Select } from '../../components/select.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useUpdateRow } from '../../lib/project-store/store-mutations.js';
import { shownQuantity } from '../../lib/quantity-words.js';
import { figureName, type PublishedId, publishedIds, unitOfPublished } from './published-units.js';

/** The figures as printed: a table, and one row to add another. Every change is stored at once. */
export function PublishedFigures({ item }: { item: Item }) {
  const store = useProjectStore();
  const update = useUpdateRow('items');
  const save = (published: Item['published']) => update.mutate({ seen: item, change: { published } });
  const remove = (id: string) => {
    const { [id]: _gone, ...rest } = item.published;
    save(rest);
  };
  const entries = Object.entries(item.published);
  return (
    <div className="flex flex-col gap-3">
      <p className="text-soft">{text.project.publishedHint}</p>
      {entries.length === 0 ? (
        <p>{text.project.noPublished}</p>
      ) : (
        <table className="w-full max-w-xl border-collapse">
          <tbody>
            {entries.map(([id, { value, unit, tolerance }]) => (
              <tr key={id} className="border-b border-line">
                <th scope="row" className="py-1 pe-3 text-start font-normal">
                  {figureName(id)}
                </th>
                <td className="py-1 pe-3 text-end font-num whitespace-nowrap">
                  {shownQuantity(value, unit)}
                  {tolerance !== undefined && ` ±\u00A0${(tolerance * 100).toPrecision(2).replace(/\.0$/, '')}\u00A0%`}
                </td>
                <td className="w-10 py-1 text-end">
                  <Button
                    look="quiet"
                    isIconOnly
                    icon={<X size={18} aria-hidden />}
                    aria-label={text.project.removeFigure(figureName(id))}
                    reason={store.readOnlyReason}
                    onClick={() => remove(id)}
                  />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {store.readOnlyReason === undefined && <AddFigure item={item} onAdd={save} />}
      {update.isError && <ErrorBar error={update.error} />}
    </div>
  );
}

function AddFigure({ item, onAdd }: { item: Item; onAdd: (published: Item['published']) => void }) {
  const free = publishedIds(item.kind).filter((id) => !(id in item.published));
  const [wanted, setWanted] = useState<PublishedId>();
  const [value, setValue] = useState<number | null>(null);
  const [tolerance, setTolerance] = useState<number | null>(null);
  const id = wanted !== undefined && free.includes(wanted) ? wanted : free[0];
  if (id === undefined) return null;
  const unit = unitOfPublished(id);
  const add = () => {
    if (value === null) return;
    const figure = { value, unit, ...(tolerance !== null && tolerance > 0 ? { tolerance: tolerance / 100 } : {}) };
    onAdd({ ...item.published, [id]: figure });
    setValue(null);
    setTolerance(null);
  };
  return (
    <form
      className="grid max-w-xl items-start gap-3 sm:grid-cols-[2fr_1.3fr_1.2fr_auto]"
      onSubmit={(event) => {
        event.preventDefault();
        add();
      }}
    >
      <Select
        label={text.project.figure}
        options={free.map((free) => ({ value: free, label: figureName(free) }))}
        value={id}
        onValue={(next) => {
          setWanted(next);
          setValue(null);
        }}
      />
      <NumberField key={id} label={text.project.value} unit={unit} value={value} onValue={setValue} />
      <NumberField label={text.project.tolerance} unit="1" value={tolerance} onValue={setTolerance} />
      <Button type="submit" className="sm:mt-6">
        {text.project.addFigure}
      </Button>
    </form>
  );
}
