import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { RegisterSchema } from '../../../shared/contracts/account.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { FormErrors } from '../../components/form-errors.js';
import { PasswordField } from '../../components/password-field.js';
import { TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';
import { register } from './account-requests.js';

const { name, email, password, teamName } = text.account;
const emptyIsAbsent = (value: unknown) => (value === '' ? undefined : value);
const FormSchema = RegisterSchema.extend({ teamName: z.preprocess(emptyIsAbsent, RegisterSchema.shape.teamName) });

export function RegisterForm({ onRegistered }: { onRegistered: (email: string) => void }) {
  const form = useForm({
    resolver: zodResolver(FormSchema, { error: schemaWords }),
    defaultValues: { name: '', email: '', password: '', teamName: '' },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const submit = form.handleSubmit((input) =>
    register(input).then(() => onRegistered(input.email), showServerErrors(form)),
  );
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex flex-col gap-4">
      <FormErrors errors={errors} labels={{ name, email, password, teamName }} tries={submitCount} />
      <TextField
        id="name"
        label={name}
        hint={text.account.nameHint}
        autoComplete="name"
        error={errors.name?.message}
        {...form.register('name')}
      />
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
        hint={text.account.passwordHint}
        autoComplete="new-password"
        error={errors.password?.message}
        {...form.register('password')}
      />
      <TextField
        id="teamName"
        label={teamName}
        hint={text.account.teamNameHint}
        isOptional
        autoComplete="organization"
        error={errors.teamName?.message}
        {...form.register('teamName')}
      />
      <SubmitButton isBusy={isSubmitting}>{text.account.register}</SubmitButton>
    </form>
  );
}
