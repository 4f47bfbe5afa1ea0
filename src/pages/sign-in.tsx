import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { NarrowPage } from '../components/narrow-page.js';
import { SignInForm } from '../features/account/sign-in-form.js';

/** Only a path of our own is a place to go on to. */
function placeAfter(asked: string | null): string {
  return asked?.startsWith('/') && !asked.startsWith('//') ? asked : '/home';
}

export function Component() {
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const to = placeAfter(search.get('to'));
  return (
    <NarrowPage title={text.account.signInTitle}>
      <SignInForm onSignedIn={() => void navigate(to, { replace: true })} />
      <ul className="mt-6 flex flex-col border-t border-line pt-3">
        {[
          { href: '/forgot', label: text.account.forgotLink },
          { href: '/register', label: `${text.account.noAccount} ${text.account.registerTitle}` },
          { href: '/try', label: text.account.tryLink },
        ].map(({ href, label }) => (
          <li key={href}>
            <Link to={href} className="inline-block py-1.5 text-heather underline">
              {label}
            </Link>
          </li>
        ))}
      </ul>
    </NarrowPage>
  );
}
