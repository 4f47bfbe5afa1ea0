import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { ForgotSchema, PasswordSchema } from '../../../shared/contracts/account.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { FormErrors } from '../../components/form-errors.js';
import { PasswordField } from '../../components/password-field.js';
import { TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';
import { askForReset, resetPassword } from './account-requests.js';

const { email, newPassword } = text.account;

export function ForgotForm({ onSent }: { onSent: (email: string) => void }) {
  const form = useForm({
    resolver: zodResolver(ForgotSchema, { error: schemaWords }),
    defaultValues: { email: '' },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const submit = form.handleSubmit((input) =>
    askForReset(input.email).then(() => onSent(input.email), showServerErrors(form)),
  );
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex flex-col gap-4">
      <FormErrors errors={errors} labels={{ email }} tries={submitCount} />
      <TextField
        id="email"
        label={email}
        type="email"
        autoComplete="username"
        inputMode="email"
        error={errors.email?.message}
        {...form.register('email')}
      />
      <SubmitButton isBusy={isSubmitting}>{text.account.forgotSend}</SubmitButton>
    </form>
  );
}

const NewPasswordSchema = z.strictObject({ password: PasswordSchema });

export function ResetForm({
  code,
  onDone,
  onNotOpen,
}: {
  code: string;
  onDone: () => void;
  onNotOpen: (error: unknown) => void;
}) {
  const form = useForm({
    resolver: zodResolver(NewPasswordSchema, { error: schemaWords }),
    defaultValues: { password: '' },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const show = showServerErrors(form);
  const fail = (error: { code?: string }) => (error.code === 'link-not-open' ? onNotOpen(error) : show(error));
  const submit = form.handleSubmit(({ password }) => resetPassword(code, password).then(onDone, fail));
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex flex-col gap-4">
      <FormErrors errors={errors} labels={{ password: newPassword }} tries={submitCount} />
      <PasswordField
        id="password"
        label={newPassword}
        hint={text.account.passwordHint}
        autoComplete="new-password"
        error={errors.password?.message}
        {...form.register('password')}
      />
      <SubmitButton isBusy={isSubmitting}>{text.account.resetSave}</SubmitButton>
    </form>
  );
}
