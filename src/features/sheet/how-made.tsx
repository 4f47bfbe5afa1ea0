import { useEffect, useState } from 'react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import { resultIdentity } from '../../../shared/result-identity.js';
import { text } from '../../../shared/text.js';
import { exactDate } from '../../lib/dates.js';
import type { CardState } from './use-card.js';

const words = text.sheet.results.made;

/** Everything that decided the digits, so that anyone can run it again and must get the same. */
export function HowMade({ definition, cardState }: { definition: CalculatorDefinition; cardState: CardState }) {
  const { kept, parts, inputs } = cardState;
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
      {inputs.map(({ role, sweep, keys }) => (
        <div key={`${role} ${sweep.id}`} className="col-span-2 grid grid-cols-subgrid">
          {row(
            definition.roles[role]?.label ?? role,
            [sweep.name, ...Object.entries(keys).map(([key, value]) => `${key} ${value}`)].join(', '),
          )}
          {row(words.source, `${sweep.source.fileName}, ${words.revision(sweep.revision.number)}`)}
          {row(words.fingerprint, sweep.revision.pointsSha256)}
        </div>
      ))}
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
