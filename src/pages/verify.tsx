import { useMutation } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { Button, ButtonLink } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { NarrowPage } from '../components/narrow-page.js';
import { verify } from '../features/account/account-requests.js';
import { meQuery } from '../lib/me.js';
import { queryClient } from '../lib/query-client.js';
import { session } from '../lib/session.js';

/** A press confirms, not the mere opening: mail scanners open links too, and a code works once. */
export function Component() {
  const { code = '' } = useParams();
  const confirm = useMutation({
    mutationFn: () => verify(code),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: meQuery.queryKey }),
  });
  const next = session.hint ? '/home' : '/sign-in';
  return (
    <NarrowPage title={text.account.verifyTitle} intro={confirm.isIdle ? text.account.verifyIntro : undefined}>
      {confirm.isError && (
        <ErrorBar error={confirm.error}>
          <ButtonLink to={next}>{session.hint ? text.common.home : text.account.signIn}</ButtonLink>
        </ErrorBar>
      )}
      {confirm.isSuccess && (
        <div role="status" className="flex flex-col items-start gap-4">
          <p className="text-read">
            {text.account.verified} {text.account.verifiedNext}
          </p>
          <ButtonLink to={next} look="primary">
            {session.hint ? text.account.goOn : text.account.signIn}
          </ButtonLink>
        </div>
      )}
      {(confirm.isIdle || confirm.isPending) && (
        <Button look="primary" isBusy={confirm.isPending} onClick={() => confirm.mutate()}>
          {text.account.verify}
        </Button>
      )}
    </NarrowPage>
  );
}
