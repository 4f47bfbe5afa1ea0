import { useNavigate } from 'react-router-dom';
import { text } from '../../../shared/text.js';
import { Dialog } from '../../components/dialog.js';
import { ProjectForm } from './project-form.js';
import { useCreateProject } from './project-requests.js';

export function NewProjectDialog({ teamId, onClose }: { teamId: string; onClose: () => void }) {
  const navigate = useNavigate();
  const create = useCreateProject(teamId);
  return (
    <Dialog title={text.project.newProject} onClose={onClose}>
      <ProjectForm
        submitLabel={text.project.makeProject}
        onSubmit={async (input) => {
          const project = await create.mutateAsync(input);
          await navigate(`/p/${project.id}`);
        }}
      />
    </Dialog>
  );
}
