import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Me } from '../../../shared/contracts/account.js';
import { ProjectSchema } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Dialog } from '../../components/dialog.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Select } from '../../components/select.js';
import { showToast } from '../../components/toast-store.js';
import { api } from '../../lib/api.js';
import { chosenTeam } from '../../lib/me.js';
import { browserStore } from '../../lib/project-store/browser-store.js';
import { keepInAccount } from '../../lib/project-store/keep-in-account.js';
import { serverStore } from '../../lib/project-store/server-store.js';
import { projectsQuery, reasonAgainst } from '../../lib/projects.js';

const words = text.sheet.keep;
const NEW = 'new';

interface KeepDialogProps {
  me: Me;
  onClose: () => void;
  /** Everything is in the account now; the path of its sheet there. */
  onKept: (path: string) => void;
}

/** Chooses the project and moves everything of this browser into it: sources, readings, sheets and kept results. */
export function KeepDialog({ me, onClose, onKept }: KeepDialogProps) {
  const team = chosenTeam(me);
  const projects = useQuery({ ...projectsQuery(team?.id ?? ''), enabled: team !== undefined }).data ?? [];
  const own = projects.filter(({ isInvented }) => !isInvented);
  const [chosen, setChosen] = useState<string>();
  const [progress, setProgress] = useState<{ done: number; total: number }>();
  const [error, setError] = useState<unknown>();
  const target = chosen ?? own[0]?.id ?? NEW;
  const reason = reasonAgainst('source:create', team, me.verified);
  const keep = async () => {
    if (!team) return;
    setError(undefined);
    setProgress({ done: 0, total: 1 });
    try {
      const projectId = target === NEW ? await newProject(team.id) : target;
      const { sheets, leftOut } = await keepInAccount(
        browserStore(),
        serverStore(projectId, undefined),
        (done, total) => setProgress({ done, total }),
      );
      if (leftOut.length > 0) showToast({ message: words.leftOut(leftOut.length), tone: 'fault' });
      const sheetId = Object.values(sheets)[0];
      onKept(sheetId ? `/p/${projectId}/sheet/${sheetId}` : `/p/${projectId}`);
    } catch (failure) {
      setError(failure);
      setProgress(undefined);
    }
  };
  return (
    <Dialog
      title={words.title}
      onClose={onClose}
      isHeld={progress !== undefined}
      actions={
        <>
          <Button onClick={onClose} disabled={progress !== undefined}>
            {text.common.cancel}
          </Button>
          <Button look="primary" isBusy={progress !== undefined} reason={reason} onClick={() => void keep()}>
            {words.keep}
          </Button>
        </>
      }
    >
      <div className="flex flex-col gap-4">
        <p>{words.body}</p>
        <Select
          label={words.project}
          value={target}
          options={[
            ...own.map(({ id, name }) => ({ value: id, label: name })),
            { value: NEW, label: words.newProject },
          ]}
          onValue={setChosen}
        />
        {reason && <p className="text-old">{reason}</p>}
        {progress && (
          <progress className="w-full" value={progress.done} max={progress.total} aria-label={words.moving} />
        )}
        {error !== undefined && <ErrorBar error={error} />}
      </div>
    </Dialog>
  );
}

async function newProject(teamId: string): Promise<string> {
  const project = await api.post(`/teams/${teamId}/projects`, { name: words.projectName }, ProjectSchema);
  return project.id;
}
