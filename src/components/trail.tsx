import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import { text } from '../../shared/text.js';

/** Where a page stands: the way back, step by step. */
export function Trail({ steps }: { steps: readonly { to: string; label: string }[] }) {
  return (
    <nav aria-label={text.common.trail} className="flex flex-wrap items-center gap-x-2">
      {steps.map(({ to, label }, i) => (
        <Fragment key={to}>
          {i > 0 && <span aria-hidden>›</span>}
          <Link to={to} className="inline-block max-w-60 truncate py-1 text-heather underline">
            {label}
          </Link>
        </Fragment>
      ))}
    </nav>
  );
}
