import { X } from 'lucide-react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { Card } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Select } from '../../components/select.js';
import { BoundedNumberField } from './bounded-number-field.js';
import { toldKeys } from './card-inputs.js';
import { useSheetScene } from './sheet-context.js';

const words = text.sheet.results;
type Input = Card['inputs'][string][number];

interface CardInputsFormProps {
  card: Card;
  definition: CalculatorDefinition;
  onInputs: (inputs: Card['inputs']) => void;
}

/** Which sweep plays which role, with what is told beside it. */
export function CardInputsForm({ card, definition, onInputs }: CardInputsFormProps) {
  return (
    <div className="flex flex-col gap-4">
      {Object.keys(definition.roles).map((role) => (
        <RoleInputs
          key={role}
          role={role}
          definition={definition}
          inputs={card.inputs[role] ?? []}
          onInputs={(inputs) => onInputs({ ...card.inputs, [role]: inputs })}
        />
      ))}
    </div>
  );
}

interface RoleInputsProps {
  role: string;
  definition: CalculatorDefinition;
  inputs: readonly Input[];
  onInputs: (inputs: Input[]) => void;
}

function RoleInputs({ role, definition, inputs, onInputs }: RoleInputsProps) {
  const { sweeps } = useSheetScene();
  const declaration = definition.roles[role];
  if (!declaration) return null;
  const { label, help, least, most } = declaration;
  const used = new Set(inputs.map(({ sweepId }) => sweepId));
  const free = sweeps.filter(({ id }) => !used.has(id));
  const add = (sweepId: string) => {
    const input: Input = { sweepId, keys: {} }; // what was told with the sweep counts until the card says otherwise
    onInputs(most === 1 ? [input] : [...inputs, input]);
  };
  const canAdd = free.length > 0 && (inputs.length < most || most === 1);
  return (
    <fieldset className="flex flex-col gap-2">
      <legend className="font-medium">
        {label} {least === 0 && <span className="font-normal text-soft">({words.optional})</span>}
      </legend>
      {inputs.map((input) => (
        <InputRow
          key={input.sweepId}
          input={input}
          role={role}
          definition={definition}
          onInput={(next) => onInputs(inputs.flatMap((each) => (each === input ? (next ?? []) : each)))}
        />
      ))}
      {canAdd && (
        <Select
          label={<span className="sr-only">{words.chooseSweep(label)}</span>}
          value=""
          options={[
            { value: '', label: promptFor(label, inputs.length, most) },
            ...free.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          onValue={add}
        />
      )}
      <p className="text-note text-soft">{help}</p>
    </fieldset>
  );
}

interface InputRowProps {
  input: Input;
  role: string;
  definition: CalculatorDefinition;
  onInput: (input: Input | undefined) => void;
}

function InputRow({ input, role, definition, onInput }: InputRowProps) {
  const { sweeps } = useSheetScene();
  const sweep = sweeps.find(({ id }) => id === input.sweepId);
  const name = sweep?.name ?? words.reasons['sweep-deleted'];
  const told = sweep ? toldKeys(definition, role, sweep) : {};
  const keys = definition.roles[role]?.keys ?? {};
  const tell = (key: string, value: number | undefined) => {
    const { [key]: _before, ...others } = input.keys;
    onInput({ ...input, keys: value === undefined ? others : { ...others, [key]: value } });
  };
  return (
    <div className="flex flex-col gap-2 border-s-2 border-line ps-3">
      <div className="flex items-center justify-between gap-2">
        <span className="min-w-0 truncate">{name}</span>
        <Button
          look="quiet"
          isIconOnly
          icon={<X size={18} aria-hidden />}
          aria-label={words.removeInput(name)}
          onClick={() => onInput(undefined)}
        />
      </div>
      {Object.entries(keys).map(([key, { label, unit, required }]) => {
        const value = input.keys[key] ?? told[key];
        return (
          <BoundedNumberField
            key={key}
            label={required ? label : `${label} (${words.optional})`}
            unit={unit}
            value={typeof value === 'number' ? value : undefined}
            least={0}
            preset={required ? undefined : 0}
            onValue={(next) => tell(key, next)}
          />
        );
      })}
    </div>
  );
}

function promptFor(label: string, count: number, most: number): string {
  if (count === 0) return words.chooseSweep(label);
  return most > 1 ? words.addInput(label) : words.changeInput(label);
}
