import { ProjectEventSchema } from '../../../shared/contracts/project-event.js';
import type { StoreEntity } from './project-store.js';

const KNOWN: readonly StoreEntity[] = ['project', 'item', 'sweep', 'sheet', 'result'];

type OnChange = (entity: StoreEntity, id: string) => void;

function take(data: unknown, onChange: OnChange): void {
  if (typeof data !== 'string') return;
  const parsed = ProjectEventSchema.safeParse(JSON.parse(data));
  if (!parsed.success) return; // a newer server may tell more than this page knows
  const entity = KNOWN.find((known) => known === parsed.data.entity);
  if (entity) onChange(entity, parsed.data.entityId);
}

/** Follows the project's event stream; the browser opens it again by itself after a loss of connection. */
export function subscribeToProject(projectId: string, onChange: OnChange): () => void {
  if (typeof EventSource === 'undefined') return () => {};
  const source = new EventSource(`/api/projects/${projectId}/events`);
  let wasLost = false;
  source.onmessage = ({ data }) => take(data, onChange);
  source.onerror = () => {
    wasLost = true;
  };
  source.onopen = () => {
    if (!wasLost) return;
    wasLost = false;
    for (const entity of KNOWN) onChange(entity, ''); // what was missed is not known: fetch all again
  };
  return () => source.close();
}
