import { useEffect, useState } from 'react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import { resultIdentity } from '../../../shared/result-identity.js';
import { text } from '../../../shared/text.js';
import { exactDate } from '../../lib/dates.js';
import { useSheetScene } from './sheet-context.js';
import type { CardState } from './use-card.js';

const words = text.sheet.results.made;

/** Everything that decided the digits, so that anyone can run it again and must get the same. */
export function HowMade({ definition, cardState }: { definition: CalculatorDefinition; cardState: CardState }) {
  const { sweeps } = useSheetScene();
  const { kept, parts } = cardState;
  const shown = kept ?? parts;
  const digest = useDigest(resultIdentity(shown), kept?.inputsSha256);
  const row = (label: string, value: string) => (
    <>
      <dt className="text-soft">{label}</dt>
      <dd className="min-w-0 font-num break-all">{value}</dd>
    </>
  );
  return (
    <dl className="grid grid-cols-[auto_1fr] gap-x-3 gap-y-1 text-note">
      {row(words.calculator, `${definition.id}, ${words.revision(shown.calculatorVersion)}`)}
      {row(words.settings, JSON.stringify(shown.settings))}
      {shown.inputs.map(({ role, sweepId, revisionId, pointsSha256, keys }) => {
        const sweep = sweeps.find(({ id }) => id === sweepId);
        const isNewest = sweep?.revision.id === revisionId;
        const reading = isNewest ? words.revision(sweep.revision.number) : words.earlierReading;
        const told = Object.entries(keys).map(([key, value]) => `${key} ${value}`);
        return (
          <div key={`${role} ${sweepId}`} className="col-span-2 grid grid-cols-subgrid">
            {row(definition.roles[role]?.label ?? role, [sweep?.name ?? sweepId, ...told].join(', '))}
            {row(words.source, `${sweep?.source.fileName ?? sweepId}, ${reading}`)}
            {row(words.fingerprint, pointsSha256)}
          </div>
        );
      })}
      {row(words.digest, digest)}
      {kept && row(words.by, kept.createdBy.name)}
      {kept && row(words.when, exactDate(kept.createdAt))}
    </dl>
  );
}

/** The sha-256 of an identity, as the store computes it for a kept result. */
function useDigest(identity: string, known: string | undefined): string {
  const [digest, setDigest] = useState('');
  useEffect(() => {
    let isCurrent = true;
    void crypto.subtle.digest('SHA-256', new TextEncoder().encode(identity)).then((bytes) => {
      const hex = Array.from(new Uint8Array(bytes), (byte) => byte.toString(16).padStart(2, '0')).join('');
      if (isCurrent) setDigest(hex);
    });
    return () => {
      isCurrent = false;
    };
  }, [identity]);
  return known ?? digest;
}
