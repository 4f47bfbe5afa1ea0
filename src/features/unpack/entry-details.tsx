import { type ReactNode, useState } from 'react';
import type { Reading } from '../../../shared/contracts/reading.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { TextField } from '../../components/text-field.js';
import { BeforeYouSweep } from './before-you-sweep.js';
import { ConditionsForm } from './conditions-form.js';
import { ItemChoice } from './item-choice.js';
import { ReadingRule } from './reading-rule.js';
import { canBeStored, type Entry, ruleToShow } from './unpack-entry.js';
import type { UnpackSession } from './unpack-session.js';

interface EntryDetailsProps {
  entry: Entry;
  session: UnpackSession;
  others: readonly Entry[];
}

/** What the chosen file is, and how it is read. */
export function EntryDetails({ entry, session, others }: EntryDetailsProps) {
  const { id, overrides } = entry;
  const rule = ruleToShow(entry);
  const alike = session.lookAlikes(id).length;
  const canStillBeStored = entry.state === 'reading' || canBeStored(entry);
  return (
    <div className="flex min-w-0 flex-col gap-6">
      {canStillBeStored && <Telling {...{ entry, session, others }} />}
      {rule && (
        <RuleFold
          key={entry.state === 'reading' ? undefined : entry.state}
          reading={rule}
          isOpen={entry.state !== 'ready'}
        >
          {alike > 0 && Object.keys(overrides).length > 0 && (
            <Button look="primary" onClick={() => session.tellLookAlikes(id)}>
              {text.unpack.rule.forSame(alike)}
            </Button>
          )}
          <ReadingRule reading={rule} overrides={overrides} onChange={(next) => session.tell(id, next)} />
        </RuleFold>
      )}
    </div>
  );
}

/** Folded while there is nothing to correct; its one line says what was recognised. */
function RuleFold({ reading, isOpen, children }: { reading: Reading; isOpen: boolean; children: ReactNode }) {
  const [open, setOpen] = useState(isOpen);
  return (
    <details className="card-rule" open={open} onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="min-h-(--control)">
        <h2 className="inline text-title">{text.unpack.ruleTitle}</h2>
        <span className="block text-note text-soft">{ruleInShort(reading)}</span>
      </summary>
      <div className="mt-3 flex flex-col gap-4">{children}</div>
    </details>
  );
}

function ruleInShort({ separator, decimalMark, columns, frequencyUnit, magnitudeUnit, phaseUnit }: Reading): string {
  const { options, inShort } = text.unpack.rule;
  const units: string[] = [options.frequencyUnit[frequencyUnit], options.magnitudeUnit[magnitudeUnit]];
  if (columns.includes('phase')) units.push(options.phaseUnit[phaseUnit]);
  return inShort(options.separator[separator], options.decimalMark[decimalMark], units.join(', '));
}

/** What it is and how it was held, with the card of that role. */
function Telling({ entry, session, others }: EntryDetailsProps) {
  const { id, name, conditions, itemId } = entry;
  const all = [entry, ...others].filter((each) => each.state === 'reading' || canBeStored(each));
  const kind = conditions.role === 'box' || conditions.role === 'part' ? conditions.role : 'driver';
  return (
    <section aria-label={text.unpack.tellTitle} className="flex flex-col gap-4">
      <h2 className="text-title">{text.unpack.tellTitle}</h2>
      <TextField
        label={text.unpack.name}
        value={name}
        maxLength={120}
        onChange={(event) => session.change(id, { name: event.target.value })}
      />
      <ConditionsForm conditions={conditions} onChange={(next) => session.change(id, { conditions: next })} />
      <ItemChoice itemId={itemId} kind={kind} onChange={(next) => session.change(id, { itemId: next })} />
      {all.length > 1 && (
        <Button
          onClick={() =>
            session.changeAll(
              all.map((each) => each.id),
              { conditions, itemId },
            )
          }
        >
          {text.unpack.forAll(all.length)}
        </Button>
      )}
      <BeforeYouSweep role={conditions.role} />
    </section>
  );
}
