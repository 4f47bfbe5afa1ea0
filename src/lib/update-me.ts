import { type Me, MeSchema, type UpdateMe } from '../../shared/contracts/account.js';
import { api } from './api.js';
import { ApiError } from './api-error.js';
import { queryClient } from './query-client.js';

const TRIES = 3;

/**
 * Changes the signed-in person's own row. Only they edit it, from one device or another: the newest word on each field
 * holds, so an edit that met another one goes again onto the newest version.
 */
export async function updateMe(change: UpdateMe): Promise<Me> {
  let known = queryClient.getQueryData<Me>(['me']);
  for (let tries = 1; ; tries += 1) {
    known ??= await api.get('/me', MeSchema);
    try {
      const saved = await api.patch('/me', change, MeSchema, { version: known.version, keepalive: true });
      queryClient.setQueryData(['me'], saved);
      return saved;
    } catch (error) {
      const isConflict = error instanceof ApiError && error.code === 'version-conflict';
      if (!isConflict || tries >= TRIES) throw error;
      known = undefined;
    }
  }
}
