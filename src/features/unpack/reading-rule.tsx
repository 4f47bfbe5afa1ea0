import type { Reading, ReadingChoice, ReadingOverrides } from '../../../shared/contracts/reading.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Select, type SelectOption } from '../../components/select.js';
import { StatusWord } from '../../components/status-word.js';
import { HeaderLinesField } from './header-lines-field.js';

const { rule } = text.unpack;

function optionsOf<Value extends string>(labels: Readonly<Record<Value, string>>): SelectOption<Value>[] {
  return (Object.keys(labels) as Value[]).map((value) => ({ value, label: labels[value] }));
}
const COLUMNS = optionsOf<Reading['columns'][number]>(rule.options.columns);

interface ReadingRuleProps {
  reading: Reading;
  overrides: ReadingOverrides;
  onChange: (overrides: ReadingOverrides) => void;
}

/** How a file is read, each part with the reason it was read so, and open to correction. */
export function ReadingRule({ reading, overrides, onChange }: ReadingRuleProps) {
  const tell = (change: ReadingOverrides) => onChange({ ...overrides, ...change });
  const forget = (choice: ReadingChoice) => {
    const { [choice]: _forgotten, ...rest } = overrides;
    onChange(rest);
  };
  const hasPhase = reading.columns.includes('phase');
  const parts = { reading, tell, forget };
  return (
    <div className="flex flex-col gap-4">
      <p className="text-soft">{rule.intro}</p>
      <Choice {...parts} choice="separator" labels={rule.options.separator} />
      <Choice {...parts} choice="decimalMark" labels={rule.options.decimalMark} />
      <Choice {...parts} choice="thousandsMark" labels={rule.options.thousandsMark} />
      <Columns {...parts} />
      <Choice {...parts} choice="frequencyUnit" labels={rule.options.frequencyUnit} />
      <Choice {...parts} choice="magnitudeUnit" labels={rule.options.magnitudeUnit} />
      {hasPhase && <Choice {...parts} choice="phaseUnit" labels={rule.options.phaseUnit} />}
      {(hasPhase || reading.columns.includes('imaginary')) && (
        <Choice {...parts} choice="phaseSign" labels={rule.options.phaseSign} />
      )}
      <div className="flex flex-col gap-1">
        <HeaderLinesField
          value={reading.headerLines}
          onValue={(headerLines) => tell({ headerLines })}
          hint={<Reason {...parts} choice="headerLines" />}
        />
      </div>
      <Choice {...parts} choice="encoding" labels={rule.options.encoding} />
      <TakenRows reading={reading} />
    </div>
  );
}

interface PartProps {
  reading: Reading;
  tell: (change: ReadingOverrides) => void;
  forget: (choice: ReadingChoice) => void;
}
type WordChoice =
  | 'separator'
  | 'decimalMark'
  | 'thousandsMark'
  | 'frequencyUnit'
  | 'magnitudeUnit'
  | 'phaseUnit'
  | 'phaseSign'
  | 'encoding';

function Choice<C extends WordChoice>({
  choice,
  labels,
  ...parts
}: PartProps & { choice: C; labels: Readonly<Record<Reading[C], string>> }) {
  return (
    <Select<Reading[C]>
      label={rule[choice]}
      options={optionsOf(labels)}
      value={parts.reading[choice]}
      onValue={(value) => parts.tell({ [choice]: value })}
      hint={<Reason {...parts} choice={choice} />}
    />
  );
}

function Columns({ reading, tell, forget }: PartProps) {
  const set = (at: number, kind: Reading['columns'][number]) => tell({ columns: reading.columns.with(at, kind) });
  return (
    <fieldset className="flex flex-col gap-2">
      <legend className="mb-1 font-medium">{rule.columns}</legend>
      {reading.columns.map((kind, i) => (
        <Select
          // biome-ignore lint/suspicious/noArrayIndexKey: a column is its place
          key={i}
          label={<span className="font-normal">{rule.column(i + 1, reading.columnNames[i] ?? '')}</span>}
          options={COLUMNS}
          value={kind}
          onValue={(next) => set(i, next)}
        />
      ))}
      <div className="text-note text-soft">
        <Reason reading={reading} forget={forget} choice="columns" />
      </div>
    </fieldset>
  );
}

/** Why it was read so, whether that is a guess, and the way back from one's own word. */
function Reason({ reading, forget, choice }: Pick<PartProps, 'reading' | 'forget'> & { choice: ReadingChoice }) {
  const guess = reading.guesses[choice];
  if (!guess) return null;
  return (
    <span className="flex flex-wrap items-center gap-x-2">
      {!guess.settled && !guess.toldByPerson && (
        <StatusWord tone="old" sign="●">
          {rule.guess}
        </StatusWord>
      )}
      {guess.toldByPerson ? <StatusWord tone="info">{rule.yours}</StatusWord> : <span>{guess.reason}</span>}
      {guess.toldByPerson && (
        <Button look="quiet" className="min-h-6! py-0 text-note" onClick={() => forget(choice)}>
          {rule.undo}
        </Button>
      )}
    </span>
  );
}

function TakenRows({ reading: { rows, skippedCount, skippedRows } }: { reading: Reading }) {
  return (
    <div>
      <p>{rule.taken(rows)}</p>
      {skippedCount > 0 && (
        <details>
          <summary className="min-h-6 py-1">{rule.skipped(skippedCount)}</summary>
          <ul className="max-h-40 overflow-y-auto text-note">
            {skippedRows.map(({ line, reason }) => (
              <li key={line}>{rule.skippedLine(line, reason)}</li>
            ))}
          </ul>
        </details>
      )}
    </div>
  );
}
