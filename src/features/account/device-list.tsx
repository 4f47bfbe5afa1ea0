import { useMutation, useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { z } from 'zod';
import type { Session } from '../../../shared/contracts/account.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Loading } from '../../components/loading.js';
import { StatusWord } from '../../components/status-word.js';
import { When } from '../../components/when.js';
import { api } from '../../lib/api.js';
import { queryClient } from '../../lib/query-client.js';
import { session } from '../../lib/session.js';
import { sessionsQuery } from './account-requests.js';

export function DeviceList() {
  const navigate = useNavigate();
  const { data: sessions, error } = useQuery(sessionsQuery);
  const endAll = useMutation({
    mutationFn: () => api.post('/me/sign-out-everywhere', {}, z.unknown()),
    onSuccess: () => {
      session.signedOut();
      queryClient.clear();
      return navigate('/sign-in');
    },
  });
  if (error) return <ErrorBar error={error} />;
  if (!sessions) return <Loading />;
  return (
    <div className="flex max-w-2xl flex-col gap-4">
      <ul className="border-t border-line">
        {sessions.map((row) => (
          <DeviceRow key={row.id} row={row} />
        ))}
      </ul>
      {endAll.isError && <ErrorBar error={endAll.error} />}
      <div>
        <Button look="danger" isBusy={endAll.isPending} onClick={() => endAll.mutate()}>
          {text.account.endEverywhere}
        </Button>
        <p className="mt-1 text-note text-soft">{text.account.endEverywhereHint}</p>
      </div>
    </div>
  );
}

function DeviceRow({ row: { id, device, lastUsedAt, isThisOne } }: { row: Session }) {
  const end = useMutation({
    mutationFn: () => api.delete(`/me/sessions/${id}`),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: sessionsQuery.queryKey }),
  });
  return (
    <li className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-line py-2">
      <span className="min-w-40 flex-1">
        {device} {isThisOne && <StatusWord tone="info">{text.account.thisDevice}</StatusWord>}
      </span>
      <span className="text-note text-soft">
        <When iso={lastUsedAt} />
      </span>
      {!isThisOne && (
        <Button isBusy={end.isPending} aria-label={text.account.endSessionOf(device)} onClick={() => end.mutate()}>
          {text.account.endSession}
        </Button>
      )}
      {end.isError && <ErrorBar error={end.error} />}
    </li>
  );
}
