import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import type { Item } from '../../shared/contracts/item.js';
import { text } from '../../shared/text.js';
import { Button } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { Section } from '../components/section.js';
import { TeamSelect } from '../components/team-select.js';
import { showToast } from '../components/toast-store.js';
import { Trail } from '../components/trail.js';
import { ItemForm } from '../features/items/item-form.js';
import { ItemHistory } from '../features/items/item-history.js';
import { PublishedFigures } from '../features/items/published-figures.js';
import { useProjectStore } from '../lib/project-store/store-context.js';
import { useDeleteRow, useRestoreRow, useUpdateRow } from '../lib/project-store/store-mutations.js';
import { itemQuery } from '../lib/project-store/store-queries.js';

export function Component() {
  return <ProjectScope>{(scope) => <ItemPage {...scope} />}</ProjectScope>;
}

function ItemPage({ project, me }: Scope) {
  const { item: itemId = '' } = useParams();
  const store = useProjectStore();
  const { data: item, error } = useQuery(itemQuery(store, itemId));
  return (
    <PageFrame
      title={item?.name ?? text.project.items}
      trail={
        <Trail
          steps={[
            { to: `/p/${project.id}`, label: project.name },
            { to: `/p/${project.id}/items`, label: text.project.items },
          ]}
        />
      }
      barContent={<TeamSelect me={me} />}
      actions={item && <DeleteItem item={item} />}
    >
      {error && <ErrorBar error={error} />}
      {!item && !error && <Loading />}
      {item && <ItemSections item={item} />}
    </PageFrame>
  );
}

function ItemSections({ item }: { item: Item }) {
  const update = useUpdateRow('items');
  return (
    <div className="grid gap-x-8 lg:grid-cols-2">
      <div>
        <Section title={text.project.kinds[item.kind]}>
          <ItemForm
            key={item.id}
            item={item}
            submitLabel={text.common.save}
            onSubmit={async ({ name, serial, note }) => {
              await update.mutateAsync({ seen: item, change: { name, serial, note } });
              showToast({ message: text.project.itemSaved });
            }}
          />
        </Section>
        <Section title={text.project.published}>
          <PublishedFigures item={item} />
        </Section>
      </div>
      <Section title={text.project.sweepsOfItem}>
        <ItemHistory item={item} />
      </Section>
    </div>
  );
}

function DeleteItem({ item }: { item: Item }) {
  const store = useProjectStore();
  const navigate = useNavigate();
  const remove = useDeleteRow('items');
  const restore = useRestoreRow('items');
  const deleteIt = async () => {
    await remove.mutateAsync(item);
    showToast({
      message: text.common.deleted(item.name),
      action: { label: text.common.undo, run: () => restore.mutate(item.id) },
    });
    await navigate(`/p/${store.projectId}/items`);
  };
  return (
    <Button
      look="danger"
      reason={store.readOnlyReason}
      isBusy={remove.isPending}
      onClick={() => void deleteIt().catch((error: Error) => showToast({ message: error.message, tone: 'fault' }))}
    >
      {text.project.deleteItem}
    </Button>
  );
}
