import { useState } from 'react';
import { Link } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { NarrowPage } from '../components/narrow-page.js';
import { RegisterForm } from '../features/account/register-form.js';

export function Component() {
  const [email, setEmail] = useState<string>();
  if (email !== undefined) {
    return (
      <NarrowPage title={text.account.letterTitle}>
        <div role="status" className="flex flex-col gap-4">
          <p className="text-read">{text.account.letterSent(email)}</p>
          <p className="text-soft">{text.account.letterLocal}</p>
          <Link to="/sign-in" className="py-1.5 text-heather underline">
            {text.account.signIn}
          </Link>
        </div>
      </NarrowPage>
    );
  }
  return (
    <NarrowPage title={text.account.registerTitle} intro={text.account.registerIntro}>
      <RegisterForm onRegistered={setEmail} />
      <p className="mt-6 border-t border-line pt-3">
        {text.account.haveAccount}{' '}
        <Link to="/sign-in" className="inline-block py-1.5 text-heather underline">
          {text.account.signIn}
        </Link>
      </p>
    </NarrowPage>
  );
}
