import { type KeyboardEvent, type ReactNode, useId, useRef } from 'react';
import { classNames } from '../lib/class-names.js';

export interface Tab<Id extends string> {
  id: Id;
  label: ReactNode;
  content: ReactNode;
}
interface TabsProps<Id extends string> {
  label: string;
  tabs: readonly Tab<Id>[];
  chosen: Id;
  onChoose: (id: Id) => void;
}

/** One tab stop; arrows, Home and End move between the tabs, and the chosen panel follows. */
export function Tabs<Id extends string>({ label, tabs, chosen, onChoose }: TabsProps<Id>) {
  const id = useId();
  const list = useRef<HTMLDivElement>(null);
  const move = (event: KeyboardEvent) => {
    const at = tabs.findIndex((tab) => tab.id === chosen);
    const steps: Record<string, number> = { ArrowRight: at + 1, ArrowLeft: at - 1, Home: 0, End: tabs.length - 1 };
    const next = steps[event.key];
    if (next === undefined) return;
    event.preventDefault();
    const target = (next + tabs.length) % tabs.length;
    const tab = tabs[target];
    if (tab) onChoose(tab.id);
    list.current?.querySelectorAll<HTMLElement>('[role=tab]')[target]?.focus();
  };
  const open = tabs.find((tab) => tab.id === chosen);
  return (
    <div className="flex min-h-0 min-w-0 flex-col">
      <div
        ref={list}
        role="tablist"
        aria-label={label}
        className="flex gap-1 overflow-x-auto border-b border-line"
        onKeyDown={move}
      >
        {tabs.map((tab) => (
          <button
            key={tab.id}
            type="button"
            role="tab"
            id={`${id}-${tab.id}`}
            aria-selected={tab.id === chosen}
            aria-controls={`${id}-panel`}
            tabIndex={tab.id === chosen ? 0 : -1}
            onClick={() => onChoose(tab.id)}
            className={classNames(
              'min-h-(--control) shrink-0 border-b-2 px-2 -outline-offset-2!',
              tab.id === chosen
                ? 'border-heather font-semibold text-ink'
                : 'border-transparent text-soft hover:text-ink',
            )}
          >
            {tab.label}
          </button>
        ))}
      </div>
      <div id={`${id}-panel`} role="tabpanel" aria-labelledby={`${id}-${chosen}`} className="min-h-0 flex-1 pt-3">
        {open?.content}
      </div>
    </div>
  );
}
