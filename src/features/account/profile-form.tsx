import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import type { Me } from '../../../shared/contracts/account.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { StatusWord } from '../../components/status-word.js';
import { TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';
import { updateMe } from '../../lib/update-me.js';

const NameSchema = z.strictObject({ name: z.string().trim().min(1).max(80) });

export function ProfileForm({ me }: { me: Me }) {
  const form = useForm({ resolver: zodResolver(NameSchema, { error: schemaWords }), defaultValues: { name: me.name } });
  const [savedName, setSavedName] = useState<string>();
  const { errors, isSubmitting } = form.formState;
  const save = async ({ name }: { name: string }) => {
    const saved = await updateMe({ name });
    form.reset({ name: saved.name });
    setSavedName(saved.name);
  };
  const submit = form.handleSubmit((input) => save(input).catch(showServerErrors(form)));
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex max-w-md flex-col gap-4">
      <TextField
        id="name"
        label={text.account.name}
        autoComplete="name"
        error={errors.name?.message ?? errors.root?.message}
        {...form.register('name')}
      />
      <p className="flex flex-wrap items-center gap-2">
        <span className="text-soft">{text.account.email}:</span> {me.email}
        <StatusWord tone={me.verified ? 'within' : 'old'} {...(me.verified ? {} : { sign: '●' })}>
          {me.verified ? text.account.emailConfirmed : text.account.emailOpen}
        </StatusWord>
      </p>
      <div className="flex items-center gap-3">
        <SubmitButton isBusy={isSubmitting}>{text.common.save}</SubmitButton>
        <span role="status" className="text-soft">
          {savedName !== undefined && savedName === form.watch('name') && text.account.youSaved}
        </span>
      </div>
    </form>
  );
}
