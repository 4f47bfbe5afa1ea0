import { useMemo } from 'react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import { settingsFields } from '../../../calculators/kit/settings-fields.js';
import type { Card } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { PistonDrawing } from './piston-drawing.js';
import { SettingsForm } from './settings-form.js';
import type { SettingsValues } from './settings-values.js';
import { useSheetScene } from './sheet-context.js';

interface CardSettingsProps {
  card: Card;
  definition: CalculatorDefinition;
  onSettings: (settings: SettingsValues) => void;
}

export function CardSettings({ card, definition, onSettings }: CardSettingsProps) {
  const { readOnlyReason } = useSheetScene();
  const fields = useMemo(() => settingsFields(definition.settings), [definition]);
  const asksForPiston = fields.some(({ path }) => path[0] === 'pistonDiameter');
  return (
    <fieldset disabled={readOnlyReason !== undefined} className="flex flex-col gap-4">
      <legend className="sr-only">{text.sheet.results.settings}</legend>
      {asksForPiston && <PistonDrawing />}
      <SettingsForm fields={fields} values={card.settings} onChange={onSettings} optionWords={text.sheet.optionWords} />
    </fieldset>
  );
}
