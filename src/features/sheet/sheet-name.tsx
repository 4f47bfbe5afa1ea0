import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Sheet } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { useUpdateRow } from '../../lib/project-store/store-mutations.js';

interface SheetNameProps {
  sheet: Sheet;
  /** The way back to the project; a sheet of this browser has none. */
  project?: { id: string; name: string };
}

/** The sheet's name in the top bar: a field that looks like text until it is used. */
export function SheetName({ sheet, project }: SheetNameProps) {
  const { readOnlyReason } = useProjectStore();
  const update = useUpdateRow('sheets');
  const [draft, setDraft] = useState<string>();
  const finish = () => {
    const name = draft?.trim();
    setDraft(undefined);
    if (name && name !== sheet.name) update.mutate({ seen: sheet, change: { name } });
  };
  return (
    <span className="flex min-w-0 items-center gap-1">
      {project && (
        <>
          <Link to={`/p/${project.id}`} className="max-w-40 truncate text-heather underline max-md:sr-only">
            {project.name}
          </Link>
          <span aria-hidden className="text-soft max-md:hidden">
            /
          </span>
        </>
      )}
      <input
        aria-label={text.sheet.nameLabel}
        value={draft ?? sheet.name}
        maxLength={120}
        readOnly={readOnlyReason !== undefined}
        onChange={(event) => setDraft(event.target.value)}
        onBlur={finish}
        onKeyDown={(event) => {
          if (event.key === 'Enter') event.currentTarget.blur();
          if (event.key === 'Escape') setDraft(undefined);
        }}
        className="min-h-(--control) field-sizing-content max-w-80 min-w-24 truncate rounded-control border border-transparent bg-transparent px-2 font-semibold text-ink hover:border-edge focus:border-edge focus:bg-raised"
      />
    </span>
  );
}
