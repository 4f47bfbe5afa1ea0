import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Dialog } from '../../components/dialog.js';
import { session } from '../../lib/session.js';
import { SignInForm } from './sign-in-form.js';

/** Over the page whose session has ended: after signing in, the waiting requests go on and nothing is lost. */
export function SignInAgain() {
  const leave = () => {
    session.signedOut();
    window.location.assign('/sign-in');
  };
  return (
    <Dialog
      title={text.account.signedOutTitle}
      onClose={leave}
      isHeld
      actions={<Button onClick={leave}>{text.account.leave}</Button>}
    >
      <p className="mb-4 text-soft">{text.account.signedOutIntro}</p>
      <SignInForm onSignedIn={() => {}} />
    </Dialog>
  );
}
