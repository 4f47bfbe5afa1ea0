import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type CreateProject, CreateProjectSchema, type Project } from '../../../shared/contracts/project.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { FormErrors } from '../../components/form-errors.js';
import { TextArea, TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';

interface ProjectFormProps {
  project?: Project;
  submitLabel: string;
  onSubmit: (input: CreateProject) => Promise<unknown>;
}

export function ProjectForm({ project, submitLabel, onSubmit }: ProjectFormProps) {
  const form = useForm({
    resolver: zodResolver(CreateProjectSchema, { error: schemaWords }),
    defaultValues: { name: project?.name ?? '', note: project?.note ?? '' },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const { name, note } = text.project;
  const submit = form.handleSubmit((input) => onSubmit(input).catch(showServerErrors(form)));
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex flex-col gap-4">
      <FormErrors errors={errors} labels={{ name, note }} tries={submitCount} />
      <TextField id="name" label={name} error={errors.name?.message} {...form.register('name')} />
      <TextArea id="note" label={note} isOptional error={errors.note?.message} {...form.register('note')} />
      <SubmitButton isBusy={isSubmitting}>{submitLabel}</SubmitButton>
    </form>
  );
}
