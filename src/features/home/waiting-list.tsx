import { useMutation, useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { z } from 'zod';
import type { Me } from '../../../shared/contracts/account.js';
import type { Project } from '../../../shared/contracts/project.js';
import { text } from '../../../shared/text.js';
import { Button, ButtonLink } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { api } from '../../lib/api.js';
import { LocalDatabase } from '../../lib/project-store/local-database.js';

interface Deletable {
  deletedAt: string | null;
}
/** How many sweeps of `/try` are in this browser and nowhere else. */
const tryQuery = {
  queryKey: ['local', 'count'],
  queryFn: async () =>
    (await new LocalDatabase().all<Deletable>('sweeps')).filter((row) => row.deletedAt === null).length,
  retry: false,
};

/** Only what really waits: an address to confirm, a try-out left in the browser, a project without sweeps. */
export function WaitingList({ me, projects }: { me: Me; projects: readonly Project[] }) {
  const { data: tried = 0 } = useQuery(tryQuery);
  const own = projects.filter(({ counts, isInvented }) => counts.sweeps === 0 && !isInvented).slice(0, 3);
  if (me.verified && tried === 0 && own.length === 0) {
    return <p className="text-soft">{text.project.nothingWaiting}</p>;
  }
  return (
    <ul>
      {!me.verified && <UnverifiedRow me={me} />}
      {tried > 0 && (
        <Row sentence={text.project.waitTry(tried)}>
          <ButtonLink to="/try">{text.project.openTry}</ButtonLink>
        </Row>
      )}
      {own.map(({ id, name }) => (
        <Row key={id} sentence={text.project.waitNoSweeps(name)}>
          <ButtonLink to={`/p/${id}/add`}>{text.project.addSweeps}</ButtonLink>
        </Row>
      ))}
    </ul>
  );
}

function Row({ sentence, children }: { sentence: string; children: ReactNode }) {
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2 border-b border-line py-2">
      <span className="min-w-48 flex-1">{sentence}</span>
      {children}
    </li>
  );
}

function UnverifiedRow({ me }: { me: Me }) {
  const again = useMutation({ mutationFn: () => api.post('/me/verification', {}, z.unknown()) });
  return (
    <>
      <Row sentence={text.project.waitVerify(me.email)}>
        <Button isBusy={again.isPending} onClick={() => again.mutate()}>
          {text.account.sendAgain}
        </Button>
      </Row>
      <li role="status" className={again.isSuccess ? 'py-1 text-within' : 'sr-only'}>
        {again.isSuccess && text.account.sentAgain}
      </li>
      {again.isError && (
        <li>
          <ErrorBar error={again.error} />
        </li>
      )}
    </>
  );
}
