import { Link } from 'react-router-dom';
import type { Project } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { Dialog } from '../../components/dialog.js';

/** Which project the sweeps go to. */
export function AddSweepsDialog({ projects, onClose }: { projects: readonly Project[]; onClose: () => void }) {
  return (
    <Dialog title={text.project.addTo} onClose={onClose}>
      <ul className="border-t border-line">
        {projects.map(({ id, name }) => (
          <li key={id} className="border-b border-line">
            <Link to={`/p/${id}/add`} className="block min-h-(--row) py-2 font-medium text-heather underline">
              {name}
            </Link>
          </li>
        ))}
      </ul>
    </Dialog>
  );
}
