import { useState } from 'react';
import { Link } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { NarrowPage } from '../components/narrow-page.js';
import { ForgotForm } from '../features/account/password-forms.js';

export function Component() {
  const [email, setEmail] = useState<string>();
  return (
    <NarrowPage title={text.account.forgotTitle} intro={email === undefined ? text.account.forgotIntro : undefined}>
      {email === undefined ? (
        <ForgotForm onSent={setEmail} />
      ) : (
        <p role="status" className="text-read">
          {text.account.forgotSent(email)}
        </p>
      )}
      <Link to="/sign-in" className="mt-6 inline-block py-1.5 text-heather underline">
        {text.account.signIn}
      </Link>
    </NarrowPage>
  );
}
