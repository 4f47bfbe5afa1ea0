import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { type CreateItem, CreateItemSchema, ITEM_KINDS, type Item } from '../../../shared/contracts/item.js';
import { schemaWords } from '../../../shared/schema-words.js';
import { text } from '../../../shared/text.js';
import { SubmitButton } from '../../components/button.js';
import { FormErrors } from '../../components/form-errors.js';
import { Select } from '../../components/select.js';
import { TextArea, TextField } from '../../components/text-field.js';
import { showServerErrors } from '../../lib/form-words.js';

const KINDS = ITEM_KINDS.map((value) => ({ value, label: text.project.kinds[value] }));

interface ItemFormProps {
  item?: Item;
  submitLabel: string;
  onSubmit: (input: Omit<CreateItem, 'published'>) => Promise<unknown>;
}

/** Name, mark and note of an item; its kind only while it is being made. */
export function ItemForm({ item, submitLabel, onSubmit }: ItemFormProps) {
  const form = useForm({
    resolver: zodResolver(CreateItemSchema.omit({ published: true }), { error: schemaWords }),
    defaultValues: {
      kind: item?.kind ?? ('driver' as const),
      name: item?.name ?? '',
      serial: item?.serial ?? '',
      note: item?.note ?? '',
    },
  });
  const { errors, isSubmitting, submitCount } = form.formState;
  const { name, serial, note, kind } = text.project;
  const submit = form.handleSubmit((input) => onSubmit(input).catch(showServerErrors(form)));
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="flex max-w-md flex-col gap-4">
      <FormErrors errors={errors} labels={{ name, serial, note }} tries={submitCount} />
      {!item && (
        <Select
          label={kind}
          options={KINDS}
          value={form.watch('kind')}
          onValue={(value) => form.setValue('kind', value, { shouldDirty: true })}
        />
      )}
      <TextField id="name" label={name} error={errors.name?.message} {...form.register('name')} />
      <TextField id="serial" label={serial} isOptional error={errors.serial?.message} {...form.register('serial')} />
      <TextArea id="note" label={note} isOptional error={errors.note?.message} {...form.register('note')} />
      <SubmitButton isBusy={isSubmitting}>{submitLabel}</SubmitButton>
    </form>
  );
}
