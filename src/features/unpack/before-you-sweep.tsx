import type { SweepRole } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';

const { cards, cautions, cardTitle, cautionTitle } = text.unpack;

/** The cautions that belong to a role, the general ones last. */
function cautionsFor(role: SweepRole): readonly string[] {
  if (role === 'part') return [cautions.part, ...cautions.all, cautions.law];
  if (role === 'box') return [...cautions.all, cautions.box, cautions.law];
  const own =
    role === 'added-mass' ? [cautions.mass] : role === 'free-air' || role === 'sweep' ? [cautions.tweeter] : [];
  return [...cautions.all, ...own, cautions.law];
}

/** Common practice for the role, and what to heed before connecting anything. */
export function BeforeYouSweep({ role }: { role: SweepRole }) {
  return (
    <aside aria-label={cardTitle} className="flex flex-col gap-3 bg-sunken p-3">
      <div>
        <h3 className="font-semibold">{cardTitle}</h3>
        <ul className="list-disc ps-5">
          {cards[role].map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      </div>
      <details>
        <summary className="min-h-6 py-1 font-semibold">
          <span aria-hidden className="text-old">
            ▲{' '}
          </span>
          {cautionTitle}
        </summary>
        <ul className="list-disc ps-5">
          {cautionsFor(role).map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      </details>
    </aside>
  );
}
