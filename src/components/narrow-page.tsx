import type { ReactNode } from 'react';
import { PageFrame } from './page-frame.js';

/** One column on one sheet: sign-in and its relatives. */
export function NarrowPage({ title, intro, children }: { title: string; intro?: ReactNode; children: ReactNode }) {
  return (
    <PageFrame title={title} isTitleHidden>
      <div className="mx-auto my-6 max-w-md neat-line p-6 sm:p-8">
        <p aria-hidden className="mb-1 text-page leading-9 font-[650] [font-variation-settings:'SHRP'_100]">
          {title}
        </p>
        {intro && <p className="mb-6 text-soft">{intro}</p>}
        {children}
      </div>
    </PageFrame>
  );
}
