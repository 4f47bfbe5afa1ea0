import { CircleHelp } from 'lucide-react';
import { lazy, type ReactNode, Suspense, useEffect, useState } from 'react';
import { Link } from 'react-router-dom';
import { text } from '../../shared/text.js';
import { classNames } from '../lib/class-names.js';
import { useSessionState } from '../lib/session.js';
import { Button, ButtonLink } from './button.js';
import { Mark } from './mark.js';
import { OfflineBar } from './offline-bar.js';

const MeMenu = lazy(() => import('./me-menu.js').then(({ MeMenu: Component }) => ({ default: Component })));
const KeysDialog = lazy(() => import('./keys-dialog.js').then(({ KeysDialog: Component }) => ({ default: Component })));

interface PageFrameProps {
  /** The page's one h1, and the tab's title. */
  title: string;
  /** Kept for screen readers only, where the page has its own picture of itself. */
  isTitleHidden?: boolean;
  /** Where this page stands: links above the title. */
  trail?: ReactNode;
  /** Buttons beside the title. */
  actions?: ReactNode;
  /** Beside the product's name in the top bar. */
  barContent?: ReactNode;
  /** The page fills the window and scrolls inside itself: the sheet. */
  isFull?: boolean;
  children: ReactNode;
}

/** Top bar, heading and main landmark of every page. */
export function PageFrame({ title, isTitleHidden, trail, actions, barContent, isFull, children }: PageFrameProps) {
  useEffect(() => {
    document.title = `${title} · ${text.common.product}`;
  }, [title]);
  return (
    <div className={classNames('flex flex-col', isFull ? 'h-dvh overflow-hidden' : 'min-h-dvh')}>
      <a
        href="#content"
        className="absolute start-2 top-2 z-50 -translate-y-20 rounded-control bg-raised px-3 py-2 text-heather focus:translate-y-0"
      >
        {text.common.skipToContent}
      </a>
      <TopBar>{barContent}</TopBar>
      <OfflineBar />
      <main
        id="content"
        tabIndex={-1}
        className={classNames(
          'flex-1 outline-none',
          isFull ? 'flex min-h-0 flex-col' : 'mx-auto w-full max-w-6xl px-4 py-6 sm:px-6',
        )}
      >
        {isTitleHidden ? (
          <h1 className="sr-only">{title}</h1>
        ) : (
          <div className="mb-6 flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
            <div className="min-w-0">
              {trail && <div className="text-soft">{trail}</div>}
              <h1 className="text-page">{title}</h1>
            </div>
            {actions && <div className="flex flex-wrap items-center gap-2">{actions}</div>}
          </div>
        )}
        {children}
      </main>
    </div>
  );
}

function TopBar({ children }: { children: ReactNode }) {
  const { hint } = useSessionState();
  const [showsKeys, setShowsKeys] = useState(false);
  return (
    <header className="sticky top-0 z-30 flex min-h-14 shrink-0 items-center gap-2 border-b border-line bg-ground px-3 sm:px-4">
      <Link
        to={hint ? '/home' : '/'}
        className="flex min-h-(--control) shrink-0 items-center gap-2 rounded-control pe-2 font-semibold text-ink no-underline"
      >
        <Mark />
        <span className={classNames(children !== undefined && 'max-sm:sr-only')}>{text.common.product}</span>
      </Link>
      <div className="flex min-w-0 flex-1 items-center gap-2">{children}</div>
      <Button
        look="quiet"
        isIconOnly
        icon={<CircleHelp size={20} aria-hidden />}
        aria-label={text.common.help}
        onClick={() => setShowsKeys(true)}
      />
      {hint ? (
        <Suspense fallback={<span className="size-(--control)" />}>
          <MeMenu />
        </Suspense>
      ) : (
        <ButtonLink to="/sign-in" look="quiet">
          {text.common.signIn}
        </ButtonLink>
      )}
      {showsKeys && (
        <Suspense fallback={null}>
          <KeysDialog onClose={() => setShowsKeys(false)} />
        </Suspense>
      )}
    </header>
  );
}
