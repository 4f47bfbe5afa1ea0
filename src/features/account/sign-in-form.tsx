import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { SignInSchema } from '../../../shared/contracts/account.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { FormErrors } from '../../components/form-errors.js';
import { PasswordField } from '../../components/password-field.js';
import { TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';
import { signIn } from './account-requests.js';

const { email, password } = text.account;

export function SignInForm({ onSignedIn }: { onSignedIn: () => void }) {
  const form = useForm({
    resolver: zodResolver(SignInSchema, { error: schemaWords }),
    defaultValues: { email: '', password: '' },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const submit = form.handleSubmit((input) => signIn(input).then(onSignedIn, showServerErrors(form)));
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex flex-col gap-4">
      <FormErrors errors={errors} labels={{ email, password }} tries={submitCount} />
      <TextField
        id="email"
        label={email}
        type="email"
        autoComplete="username"
        inputMode="email"
        error={errors.email?.message}
        {...form.register('email')}
      />
      <PasswordField
        id="password"
        label={password}
        autoComplete="current-password"
        error={errors.password?.message}
        {...form.register('password')}
      />
      <SubmitButton isBusy={isSubmitting}>{text.account.signIn}</SubmitButton>
    </form>
  );
}
