import { useQuery } from '@tanstack/react-query';
import { Plus } from 'lucide-react';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { Button } from '../components/button.js';
import { Dialog } from '../components/dialog.js';
import { EmptyState } from '../components/empty-state.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { TeamSelect } from '../components/team-select.js';
import { Trail } from '../components/trail.js';
import { ItemForm } from '../features/items/item-form.js';
import { ItemTable } from '../features/items/item-table.js';
import { useProjectStore } from '../lib/project-store/store-context.js';
import { useAddRow } from '../lib/project-store/store-mutations.js';
import { itemsQuery } from '../lib/project-store/store-queries.js';

export function Component() {
  return <ProjectScope>{(scope) => <ItemsPage {...scope} />}</ProjectScope>;
}

function ItemsPage({ project, me }: Scope) {
  const store = useProjectStore();
  const { data: items, error } = useQuery(itemsQuery(store));
  const [isAdding, setIsAdding] = useState(false);
  const addButton = (
    <Button
      look="primary"
      icon={<Plus size={18} aria-hidden />}
      reason={store.readOnlyReason}
      onClick={() => setIsAdding(true)}
    >
      {text.project.newItem}
    </Button>
  );
  return (
    <PageFrame
      title={text.project.items}
      trail={
        <Trail
          steps={[
            { to: '/home', label: text.common.home },
            { to: `/p/${project.id}`, label: project.name },
          ]}
        />
      }
      barContent={<TeamSelect me={me} />}
      actions={addButton}
    >
      {error && <ErrorBar error={error} />}
      {!items && !error && <Loading />}
      {items?.length === 0 && <EmptyState title={text.project.noItems}>{text.project.noItemsHint}</EmptyState>}
      {items && items.length > 0 && <ItemTable items={items} />}
      {isAdding && <NewItemDialog onClose={() => setIsAdding(false)} />}
    </PageFrame>
  );
}

function NewItemDialog({ onClose }: { onClose: () => void }) {
  const store = useProjectStore();
  const navigate = useNavigate();
  const add = useAddRow('items');
  return (
    <Dialog title={text.project.newItem} onClose={onClose}>
      <ItemForm
        submitLabel={text.project.makeItem}
        onSubmit={async (input) => {
          const item = await add.mutateAsync({ ...input, published: {} });
          await navigate(`/p/${store.projectId}/item/${item.id}`);
        }}
      />
    </Dialog>
  );
}
