import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { ButtonLink } from '../components/button.js';
import { ErrorBar } from '../components/error-bar.js';
import { NarrowPage } from '../components/narrow-page.js';
import { ResetForm } from '../features/account/password-forms.js';

export function Component() {
  const { code = '' } = useParams();
  const [isDone, setIsDone] = useState(false);
  const [notOpen, setNotOpen] = useState<unknown>();
  return (
    <NarrowPage title={text.account.resetTitle}>
      {notOpen !== undefined && (
        <ErrorBar error={notOpen}>
          <ButtonLink to="/forgot" look="primary">
            {text.account.resetAgain}
          </ButtonLink>
        </ErrorBar>
      )}
      {isDone && (
        <div role="status" className="flex flex-col items-start gap-4">
          <p className="text-read">{text.account.resetDone}</p>
          <ButtonLink to="/sign-in" look="primary">
            {text.account.signIn}
          </ButtonLink>
        </div>
      )}
      {!isDone && notOpen === undefined && (
        <ResetForm code={code} onDone={() => setIsDone(true)} onNotOpen={setNotOpen} />
      )}
    </NarrowPage>
  );
}
