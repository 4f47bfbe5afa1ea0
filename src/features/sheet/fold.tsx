import { type ReactNode, useState } from 'react';

/** A part of a card that folds away; its state is the browser's own details element. */
export function Fold({
  title,
  isOpenAtFirst,
  children,
}: {
  title: string;
  isOpenAtFirst?: boolean;
  children: ReactNode;
}) {
  const [isOpen, setIsOpen] = useState(isOpenAtFirst ?? false);
  return (
    <details open={isOpen} onToggle={(event) => setIsOpen(event.currentTarget.open)} className="border-t border-line">
      <summary className="flex min-h-(--control) cursor-pointer items-center gap-2 font-medium">
        <span aria-hidden className="inline-block w-3 text-soft">
          {isOpen ? '▾' : '▸'}
        </span>
        {title}
      </summary>
      <div className="pb-3 ps-5">{isOpen && children}</div>
    </details>
  );
}
