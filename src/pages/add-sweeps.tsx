import { useNavigate } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { PageFrame } from '../components/page-frame.js';
import { ProjectScope, type Scope } from '../components/project-scope.js';
import { TeamSelect } from '../components/team-select.js';
import { Trail } from '../components/trail.js';
import { Unpack } from '../features/unpack/unpack.js';
import type { StoredBatch } from '../features/unpack/unpack-session.js';
import { newSheet } from '../lib/new-sheet.js';
import { useAddRow } from '../lib/project-store/store-mutations.js';

export function Component() {
  return <ProjectScope>{(scope) => <AddSweepsPage {...scope} />}</ProjectScope>;
}

function AddSweepsPage({ project, me }: Scope) {
  const navigate = useNavigate();
  const addSheet = useAddRow('sheets');
  /** The new sweeps stand on a new sheet; where that fails, the Ledger shows them all the same. */
  const showOnSheet = async ({ sweeps }: StoredBatch) => {
    if (sweeps.length === 0) return navigate(`/p/${project.id}`);
    const [first] = sweeps;
    const name = sweeps.length === 1 ? first?.name : undefined;
    const sheet = await addSheet
      .mutateAsync(
        newSheet(
          sweeps.map(({ id }) => id),
          name,
        ),
      )
      .catch(() => undefined);
    return navigate(sheet ? `/p/${project.id}/sheet/${sheet.id}` : `/p/${project.id}`);
  };
  return (
    <PageFrame
      title={text.unpack.title}
      trail={
        <Trail
          steps={[
            { to: '/home', label: text.common.home },
            { to: `/p/${project.id}`, label: project.name },
          ]}
        />
      }
      barContent={<TeamSelect me={me} />}
    >
      <Unpack onAdded={(batch) => void showOnSheet(batch)} />
    </PageFrame>
  );
}
