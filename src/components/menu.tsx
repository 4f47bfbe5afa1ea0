import type { ReactNode } from 'react';
import { Button as AriaButton, Menu as AriaMenu, MenuItem, MenuTrigger, Popover } from 'react-aria-components';
import { type ButtonLook, buttonClass } from './button.js';

export interface MenuEntry {
  id: string;
  label: string;
  onAction?: () => void;
  /** A link instead of an action. */
  href?: string;
  icon?: ReactNode;
  isDanger?: boolean;
  isDisabled?: boolean;
}
interface MenuProps {
  label: string;
  children: ReactNode;
  entries: readonly MenuEntry[];
  look?: ButtonLook;
  isIconOnly?: boolean;
  /** Not a stop of Tab: in a list with one stop a row. */
  isSkippedByTab?: boolean;
}

/** A button that opens a list of actions. Load it lazily where the first route could reach it. */
export function Menu({ label, children, entries, look = 'quiet', isIconOnly, isSkippedByTab }: MenuProps) {
  return (
    <MenuTrigger>
      <AriaButton
        aria-label={label}
        excludeFromTabOrder={isSkippedByTab ?? false}
        className={buttonClass(look, isIconOnly)}
      >
        {children}
      </AriaButton>
      <Popover className="min-w-48 animate-rise rounded-control border border-line bg-raised p-1 shadow-lift">
        <AriaMenu aria-label={label} className="outline-none">
          {entries.map(({ id, label: entryLabel, onAction, href, icon, isDanger, isDisabled }) => (
            <MenuItem
              key={id}
              id={id}
              textValue={entryLabel}
              {...(onAction ? { onAction } : {})}
              {...(href ? { href } : {})}
              isDisabled={isDisabled ?? false}
              className={`flex min-h-(--control) cursor-pointer items-center gap-2 rounded-tag px-3 no-underline outline-none data-focused:bg-heather-wash data-focused:outline-2 data-focused:-outline-offset-2 data-focused:outline-focus data-disabled:cursor-default data-disabled:opacity-60 ${isDanger ? 'text-out' : 'text-ink'}`}
            >
              {icon}
              {entryLabel}
            </MenuItem>
          ))}
        </AriaMenu>
      </Popover>
    </MenuTrigger>
  );
}
