import { useQuery } from '@tanstack/react-query';
import { type ReactNode, useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import type { SweepRow } from '../../shared/contracts/sweep.js';
import { text } from '../../shared/text.js';
import { Button } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { Loading } from '../components/loading.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { Tabs } from '../components/tabs.js';
import { TeamSelect } from '../components/team-select.js';
import { showToast } from '../components/toast-store.js';
import { Trail } from '../components/trail.js';
import { RevisionList } from '../features/projects/revision-list.js';
import { SweepFacts } from '../features/projects/sweep-facts.js';
import { ReadAgain } from '../features/unpack/read-again.js';
import { StoredConditions } from '../features/unpack/stored-conditions.js';
import { newSheet } from '../lib/new-sheet.js';
import { useProjectStore } from '../lib/project-store/store-context.js';
import { useAddRow, useDeleteRow, useRestoreRow } from '../lib/project-store/store-mutations.js';
import { sweepQuery } from '../lib/project-store/store-queries.js';

export function Component() {
  return <ProjectScope>{(scope) => <SweepPage {...scope} />}</ProjectScope>;
}

function SweepPage({ project, me }: Scope) {
  const { sweep: sweepId = '' } = useParams();
  const store = useProjectStore();
  const { data: sweep, error } = useQuery(sweepQuery(store, sweepId));
  return (
    <PageFrame
      title={sweep?.name ?? text.project.ledger}
      trail={
        <Trail
          steps={[
            { to: '/home', label: text.common.home },
            { to: `/p/${project.id}`, label: project.name },
          ]}
        />
      }
      barContent={<TeamSelect me={me} />}
      actions={sweep && <SweepActions sweep={sweep} />}
    >
      {error && <ErrorBar error={error} />}
      {!sweep && !error && <Loading />}
      {sweep && (
        <ReadAgain key={sweep.revision.id} sweep={sweep} aside={(rule) => <SweepTabs sweep={sweep} rule={rule} />} />
      )}
    </PageFrame>
  );
}

type TabId = 'conditions' | 'facts' | 'rule' | 'revisions';

function SweepTabs({ sweep, rule }: { sweep: SweepRow; rule: ReactNode }) {
  const [chosen, setChosen] = useState<TabId>('conditions');
  return (
    <Tabs<TabId>
      label={text.project.aboutSweep}
      chosen={chosen}
      onChoose={setChosen}
      tabs={[
        {
          id: 'conditions',
          label: text.unpack.tellTitle,
          content: <StoredConditions key={sweep.version} sweep={sweep} />,
        },
        { id: 'facts', label: text.project.sweepFacts, content: <SweepFacts sweep={sweep} /> },
        { id: 'rule', label: text.project.readingRule, content: rule },
        { id: 'revisions', label: text.project.revisions, content: <RevisionList sweep={sweep} /> },
      ]}
    />
  );
}

function SweepActions({ sweep }: { sweep: SweepRow }) {
  const store = useProjectStore();
  const navigate = useNavigate();
  const addSheet = useAddRow('sheets');
  const remove = useDeleteRow('sweeps');
  const restore = useRestoreRow('sweeps');
  const say = (error: Error) => showToast({ message: error.message, tone: 'fault' });
  const draw = async () => {
    const sheet = await addSheet.mutateAsync(newSheet([sweep.id], sweep.name));
    await navigate(`/p/${store.projectId}/sheet/${sheet.id}`);
  };
  const deleteIt = async () => {
    await remove.mutateAsync(sweep);
    showToast({
      message: text.common.deleted(sweep.name),
      action: { label: text.common.undo, run: () => restore.mutate(sweep.id) },
    });
    await navigate(`/p/${store.projectId}`);
  };
  return (
    <>
      <Button look="danger" reason={store.readOnlyReason} onClick={() => void deleteIt().catch(say)}>
        {text.common.delete}
      </Button>
      <Button look="primary" reason={store.readOnlyReason} onClick={() => void draw().catch(say)}>
        {text.project.drawSelected(1)}
      </Button>
    </>
  );
}
