import type { Preferences } from '../../../shared/contracts/account.js';
import { text } from '../../../shared/text.js';
import { Checkbox } from '../../components/checkbox.js';
import { Select, type SelectOption } from '../../components/select.js';
import { setPreferences, usePreferences } from '../../lib/preferences.js';

const words = text.account;

function optionsOf<Value extends string>(labels: Readonly<Record<Value, string>>): SelectOption<Value>[] {
  return (Object.keys(labels) as Value[]).map((value) => ({ value, label: labels[value] }));
}
const THEMES = optionsOf<Preferences['theme']>(words.themes);
const DENSITIES = optionsOf<Preferences['density']>(words.densities);
const UNITS = optionsOf<Preferences['units']>(words.unitSystems);
const LOCALES: SelectOption<string>[] = [
  { value: '', label: words.locales.browser },
  { value: 'en-GB', label: words.locales.point },
  { value: 'de-DE', label: words.locales.comma },
  { value: 'fr-FR', label: words.locales.commaFrench },
];

/** How the screen looks and writes. Each change holds at once; there is nothing to press. */
export function ScreenSettings() {
  const { theme, density, units, locale, symbolsFirst, letterKeys } = usePreferences();
  return (
    <div className="grid max-w-2xl gap-4 sm:grid-cols-2">
      <Select
        label={words.theme}
        options={THEMES}
        value={theme}
        onValue={(value) => setPreferences({ theme: value })}
      />
      <Select
        label={words.density}
        options={DENSITIES}
        value={density}
        onValue={(value) => setPreferences({ density: value })}
      />
      <Select label={words.units} options={UNITS} value={units} onValue={(value) => setPreferences({ units: value })} />
      <Select
        label={words.locale}
        options={LOCALES}
        value={locale ?? ''}
        onValue={(value) => setPreferences({ locale: value || null })}
      />
      <Checkbox
        label={words.symbolsFirst}
        hint={words.symbolsFirstHint}
        checked={symbolsFirst}
        onChange={(event) => setPreferences({ symbolsFirst: event.target.checked })}
      />
      <Checkbox
        label={words.letterKeys}
        hint={words.letterKeysHint}
        checked={letterKeys}
        onChange={(event) => setPreferences({ letterKeys: event.target.checked })}
      />
    </div>
  );
}
