import { SWEEP_ROLES, type SweepConditions, type SweepRole } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { NumberField } from '../../components/number-field.js';
import { Select } from '../../components/select.js';

const words = text.unpack;
const ROLES = SWEEP_ROLES.map((value) => ({ value, label: text.project.roles[value] }));

interface ConditionsFormProps {
  conditions: SweepConditions;
  onChange: (conditions: SweepConditions) => void;
}
type NumberKey = 'addedMassKg' | 'testVolumeM3' | 'radiatorMassKg' | 'levelV' | 'temperatureK';

/** How the thing was held, and what belongs to that: only what is told is stored. */
export function ConditionsForm({ conditions, onChange }: ConditionsFormProps) {
  const { role } = conditions;
  const set = (key: NumberKey, value: number | null) => {
    const { [key]: _before, ...rest } = conditions;
    onChange(value === null ? rest : { ...rest, [key]: value });
  };
  const number = (key: NumberKey) => ({
    value: conditions[key] ?? null,
    onValue: (value: number | null) => set(key, value),
  });
  return (
    <div className="flex flex-col gap-4">
      <Select<SweepRole>
        label={words.role}
        options={ROLES}
        value={role}
        onValue={(next) => onChange({ ...conditionsWithoutRoleKeys(conditions), role: next })}
      />
      {role === 'added-mass' && (
        <NumberField
          label={words.addedMass}
          hint={words.addedMassHint}
          unit="kg"
          usualValue={0.02}
          {...number('addedMassKg')}
        />
      )}
      {role === 'known-volume' && (
        <NumberField
          label={words.testVolume}
          hint={words.testVolumeHint}
          unit="m³"
          usualValue={0.02}
          {...number('testVolumeM3')}
        />
      )}
      {role === 'box' && (
        <NumberField label={words.radiatorMass} isOptional unit="kg" usualValue={0.02} {...number('radiatorMassKg')} />
      )}
      <details>
        <summary className="min-h-6 py-1">{words.moreConditions}</summary>
        <div className="mt-2 grid grid-cols-2 gap-3">
          <NumberField label={words.level} isOptional unit="V" usualValue={1} {...number('levelV')} />
          <NumberField label={words.temperature} isOptional unit="K" usualValue={293} {...number('temperatureK')} />
        </div>
      </details>
    </div>
  );
}

/** Another role: what belonged to the one before is forgotten. */
function conditionsWithoutRoleKeys(conditions: SweepConditions): SweepConditions {
  const { addedMassKg: _mass, testVolumeM3: _volume, radiatorMassKg: _radiator, ...rest } = conditions;
  return rest;
}
