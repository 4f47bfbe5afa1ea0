import type { ReactNode } from 'react';
import { HumpLine } from './mark.js';

/** Nothing here yet: what it would be, and how to get it. */
export function EmptyState({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="flex flex-col items-center gap-3 px-4 py-8 text-center">
      <HumpLine kind="empty" />
      <p className="text-read font-medium">{title}</p>
      {children && <div className="max-w-prose text-soft">{children}</div>}
      {action && <div className="flex flex-wrap justify-center gap-2">{action}</div>}
    </div>
  );
}
