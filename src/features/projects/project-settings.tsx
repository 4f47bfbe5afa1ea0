import { useNavigate } from 'react-router-dom';
import type { Project } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Dialog } from '../../components/dialog.js';
import { ErrorBar } from '../../components/error-bar.js';
import { showToast } from '../../components/toast-store.js';
import { ProjectForm } from './project-form.js';
import { useDeleteProject, useRestoreProject, useUpdateProject } from './project-requests.js';

export function ProjectSettings({ project, onClose }: { project: Project; onClose: () => void }) {
  const navigate = useNavigate();
  const update = useUpdateProject();
  const remove = useDeleteProject();
  const restore = useRestoreProject();
  const deleteIt = async () => {
    await remove.mutateAsync(project);
    showToast({
      message: text.common.deleted(project.name),
      action: { label: text.common.undo, run: () => restore.mutate(project.id) },
    });
    await navigate('/home');
  };
  return (
    <Dialog title={text.project.settings} onClose={onClose}>
      <ProjectForm
        project={project}
        submitLabel={text.common.save}
        onSubmit={async (change) => {
          await update.mutateAsync({ seen: project, change });
          onClose();
        }}
      />
      <div className="mt-6 border-t border-line pt-4">
        <p className="mb-2 text-soft">{text.project.deleteProjectSure(project.name)}</p>
        <Button look="danger" isBusy={remove.isPending} onClick={() => void deleteIt().catch(() => {})}>
          {text.project.deleteProject}
        </Button>
        {remove.isError && <ErrorBar error={remove.error} />}
      </div>
    </Dialog>
  );
}
