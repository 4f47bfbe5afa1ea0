import { type ReactNode, useState } from 'react';
import { text } from '../../../shared/text.js';
import { TextField } from '../../components/text-field.js';

const MOST = 100_000;

/** A whole number, taken when the field is left or Enter is pressed: reading again at every digit helps nobody. */
export function HeaderLinesField(props: { value: number; onValue: (lines: number) => void; hint: ReactNode }) {
  const { value, onValue, hint } = props;
  const [draft, setDraft] = useState<string>();
  const take = () => {
    const lines = Number.parseInt(draft ?? '', 10);
    if (lines >= 0 && lines <= MOST && lines !== value) onValue(lines);
    setDraft(undefined);
  };
  return (
    <TextField
      label={text.unpack.rule.headerLines}
      hint={hint}
      inputMode="numeric"
      value={draft ?? String(value)}
      onChange={(event) => setDraft(event.target.value)}
      onBlur={take}
      onKeyDown={(event) => event.key === 'Enter' && take()}
    />
  );
}
