import { useMutation } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { useParams } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { Button, ButtonLink, SubmitButton } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { NarrowPage } from '../components/narrow-page.js';
import { PasswordField } from '../components/password-field.js';
import { verify } from '../features/account/account-requests.js';
import { ApiError } from '../lib/api-error.js';
import { meQuery } from '../lib/me.js';
import { queryClient } from '../lib/query-client.js';
import { session } from '../lib/session.js';

/**
 * A press confirms, not the mere opening: mail scanners open links too, and a code works once. In another browser than
 * the one that registered the password is asked for as well.
 */
export function Component() {
  const { code = '' } = useParams();
  const [password, setPassword] = useState('');
  const [asksPassword, setAsksPassword] = useState(false);
  const confirm = useMutation({
    mutationFn: (given?: string) => verify(code, given),
    onError: (error) => setAsksPassword((asked) => asked || isPasswordNeeded(error)),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: meQuery.queryKey }),
  });
  const confirmWithPassword = (event: FormEvent) => {
    event.preventDefault();
    confirm.mutate(password);
  };
  const next = session.hint ? '/home' : '/sign-in';
  return (
    <NarrowPage title={text.account.verifyTitle} intro={confirm.isIdle ? text.account.verifyIntro : undefined}>
      {confirm.isError && (
        <ErrorBar error={confirm.error}>
          {isPasswordNeeded(confirm.error) ? (
            <ButtonLink to="/forgot">{text.account.forgotTitle}</ButtonLink>
          ) : (
            <ButtonLink to={next}>{session.hint ? text.common.home : text.account.signIn}</ButtonLink>
          )}
        </ErrorBar>
      )}
      {asksPassword && !confirm.isSuccess && (
        <form onSubmit={confirmWithPassword} className="flex flex-col gap-4">
          <PasswordField
            id="password"
            label={text.account.password}
            autoComplete="current-password"
            value={password}
            onChange={(event) => setPassword(event.target.value)}
            required
            autoFocus
          />
          <SubmitButton isBusy={confirm.isPending}>{text.account.verify}</SubmitButton>
        </form>
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
      {!asksPassword && (confirm.isIdle || confirm.isPending) && (
        <Button look="primary" isBusy={confirm.isPending} onClick={() => confirm.mutate(undefined)}>
          {text.account.verify}
        </Button>
      )}
    </NarrowPage>
  );
}

function isPasswordNeeded(error: unknown): boolean {
  return error instanceof ApiError && error.code === 'password-needed';
}
