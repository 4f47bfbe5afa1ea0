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
  const { id, name, conditions, itemId, overrides } = entry;
  const rule = ruleToShow(entry);
  const alike = session.lookAlikes(id).length;
  const all = [entry, ...others].filter((each) => each.state === 'reading' || canBeStored(each));
  const kind = conditions.role === 'box' || conditions.role === 'part' ? conditions.role : 'driver';
  return (
    <div className="flex min-w-0 flex-col gap-6">
      <section aria-label={text.unpack.tellTitle} className="flex flex-col gap-4">
        <h3 className="text-title font-[650]">{text.unpack.tellTitle}</h3>
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
      {rule && (
        <section aria-label={text.unpack.ruleTitle} className="flex flex-col gap-4 card-rule">
          <h3 className="text-title font-[650]">{text.unpack.ruleTitle}</h3>
          {alike > 0 && Object.keys(overrides).length > 0 && (
            <Button look="primary" onClick={() => session.tellLookAlikes(id)}>
              {text.unpack.rule.forSame(alike)}
            </Button>
          )}
          <ReadingRule reading={rule} overrides={overrides} onChange={(next) => session.tell(id, next)} />
        </section>
      )}
    </div>
  );
}
