import { useState } from 'react';
import type {
  AlternativesSetting,
  GroupSetting,
  NumberSetting,
  RangeSetting,
  SettingsField,
} from '../../../calculators/kit/settings-fields.js';
import { text } from '../../../shared/text.js';
import { Checkbox } from '../../components/checkbox.js';
import { Select } from '../../components/select.js';
import { TextField } from '../../components/text-field.js';
import { BoundedNumberField } from './bounded-number-field.js';
import { type SettingsValues, settingAt, withSetting } from './settings-values.js';

const words = text.sheet.results;

interface SettingsFormProps {
  fields: readonly SettingsField[];
  values: SettingsValues;
  onChange: (values: SettingsValues) => void;
  /** Names of choices in words, by their value; a choice without one shows its value. */
  optionWords: Readonly<Record<string, string>>;
}

/** A form made from a calculator's settings schema: label, unit, range, default and help of every field. */
export function SettingsForm({ fields, ...rest }: SettingsFormProps) {
  const headings = [...new Set(fields.map((field) => field.heading))];
  return (
    <div className="flex flex-col gap-4">
      {headings.map((heading) => (
        <fieldset key={heading} className="flex flex-col gap-3">
          {heading && <legend className="mb-2 text-note font-semibold text-soft">{heading}</legend>}
          {fields
            .filter((field) => field.heading === heading)
            .map((field) => (
              <SettingControl key={field.path.join('.')} field={field} {...rest} />
            ))}
        </fieldset>
      ))}
    </div>
  );
}

type ControlProps<Field extends SettingsField> = Omit<SettingsFormProps, 'fields'> & { field: Field };

function SettingControl(props: ControlProps<SettingsField>) {
  const { field, values, onChange, optionWords } = props;
  const value = settingAt(values, field.path);
  const set = (next: unknown) => onChange(withSetting(values, field.path, next));
  switch (field.kind) {
    case 'number':
      return <NumberControl field={field} value={value} onValue={set} />;
    case 'choice': {
      const chosen = typeof value === 'string' ? value : (field.preset ?? '');
      const options = field.options.map((option) => ({ value: option, label: optionWords[option] ?? option }));
      const open = field.preset === null ? [{ value: '', label: words.auto }, ...options] : options;
      return (
        <Select
          label={field.label}
          hint={field.help}
          options={open}
          value={chosen}
          onValue={(next) => set(next === '' || next === field.preset ? undefined : next)}
        />
      );
    }
    case 'toggle':
      return (
        <Checkbox
          label={field.label}
          hint={field.help}
          checked={typeof value === 'boolean' ? value : field.preset}
          onChange={(event) => set(event.target.checked === field.preset ? undefined : event.target.checked)}
        />
      );
    case 'text':
      return (
        <TextField
          label={field.label}
          hint={field.help}
          value={typeof value === 'string' ? value : ''}
          onChange={(event) => set(event.target.value === '' ? undefined : event.target.value)}
        />
      );
    case 'range':
      return <RangeControl field={field} value={value} onValue={set} />;
    case 'group':
      return <GroupControl {...props} field={field} />;
    case 'alternatives':
      return <AlternativesControl {...props} field={field} />;
  }
}

interface ValueProps<Field> {
  field: Field;
  value: unknown;
  onValue: (value: unknown) => void;
}

function NumberControl({ field, value, onValue }: ValueProps<NumberSetting>) {
  return (
    <BoundedNumberField
      label={field.label}
      hint={field.help}
      unit={field.unit}
      value={typeof value === 'number' ? value : undefined}
      preset={field.preset ?? undefined}
      least={field.least ?? undefined}
      most={field.most ?? undefined}
      isInteger={field.isInteger}
      onValue={(next) => onValue(next === field.preset ? undefined : next)}
    />
  );
}

/** Low and high of one unit; stored once both ends are there. */
function RangeControl({ field, value, onValue }: ValueProps<RangeSetting>) {
  const stored = Array.isArray(value) ? (value as unknown[]) : [];
  const [ends, setEnds] = useState<readonly (number | undefined)[]>([numberOr(stored[0]), numberOr(stored[1])]);
  const change = (at: 0 | 1, end: number | undefined) => {
    const next = at === 0 ? [end, ends[1]] : [ends[0], end];
    setEnds(next);
    if (next.every((each) => each !== undefined)) onValue(next);
    else if (value !== undefined) onValue(undefined);
  };
  return (
    <fieldset className="flex flex-col gap-1">
      <legend className="font-medium">{field.label}</legend>
      <div className="grid grid-cols-2 gap-2">
        <BoundedNumberField
          label={words.asRange.from}
          unit={field.unit}
          value={ends[0]}
          onValue={(end) => change(0, end)}
        />
        <BoundedNumberField
          label={words.asRange.to}
          unit={field.unit}
          value={ends[1]}
          onValue={(end) => change(1, end)}
        />
      </div>
      <p className="text-note text-soft">{field.help}</p>
    </fieldset>
  );
}

function GroupControl({ field, ...rest }: ControlProps<GroupSetting>) {
  return (
    <fieldset className="flex flex-col gap-3 border-s-2 border-line ps-3">
      <legend className="font-medium">{field.label}</legend>
      {field.help && <p className="text-note text-soft">{field.help}</p>}
      {field.fields.map((inner) => (
        <SettingControl key={inner.path.join('.')} field={inner} {...rest} />
      ))}
    </fieldset>
  );
}

function AlternativesControl({ field, ...rest }: ControlProps<AlternativesSetting>) {
  const value = settingAt(rest.values, field.path);
  const filled = field.alternatives.findIndex((group) =>
    group.fields.some((inner) => settingAt(rest.values, inner.path) !== undefined),
  );
  const [chosen, setChosen] = useState(Math.max(0, filled));
  const group = field.alternatives[chosen];
  const choose = (next: string) => {
    setChosen(Number(next));
    if (value !== undefined) rest.onChange(withSetting(rest.values, field.path, undefined));
  };
  return (
    <div className="flex flex-col gap-3">
      <Select
        label={field.label}
        hint={field.help}
        options={field.alternatives.map(({ label }, i) => ({ value: String(i), label }))}
        value={String(chosen)}
        onValue={choose}
      />
      {group && (
        <div className="flex flex-col gap-3 border-s-2 border-line ps-3">
          {group.fields.map((inner) => (
            <SettingControl key={inner.path.join('.')} field={inner} {...rest} />
          ))}
        </div>
      )}
    </div>
  );
}

function numberOr(value: unknown): number | undefined {
  return typeof value === 'number' ? value : undefined;
}
