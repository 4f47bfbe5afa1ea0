import { ChevronDown, ChevronUp } from 'lucide-react';
import { type ReactNode, useRef, useState } from 'react';
import {
  Group,
  type GroupImperativeHandle,
  type Layout,
  Panel,
  type PanelImperativeHandle,
  Separator,
} from 'react-resizable-panels';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Menu } from '../../components/menu.js';
import { classNames } from '../../lib/class-names.js';
import { getPreferences, setPreferences } from '../../lib/preferences.js';
import type { PaneId } from './pane.js';
import { type ScreenSize, useScreenSize } from './use-screen-size.js';

const words = text.sheet;
const WIDTHS: Layout = { ledger: 23, chart: 50, results: 27 };
const STEP = 4; // per cent, of "wider" and "narrower"

export type PaneContent = Readonly<Record<PaneId, (sizeMenu: ReactNode, isOpen: boolean) => ReactNode>>;

/** The four panes for the screen at hand; their sizes are remembered per person. */
export function PaneLayout({ panes }: { panes: PaneContent }) {
  const size = useScreenSize();
  return size === 'small' ? <SmallLayout panes={panes} /> : <SplitLayout panes={panes} size={size} />;
}

function SplitLayout({ panes, size }: { panes: PaneContent; size: Exclude<ScreenSize, 'small'> }) {
  const [side, setSide] = useState<'ledger' | 'results'>('results');
  const group = useRef<GroupImperativeHandle>(null);
  const footnotes = useRef<PanelImperativeHandle>(null);
  const [isFootOpen, setIsFootOpen] = useState(false);
  const shown: readonly PaneId[] = size === 'wide' ? ['ledger', 'chart', 'results'] : ['chart', 'results'];
  const remember = (layout: Layout) =>
    setPreferences({ paneSizes: { ...getPreferences().paneSizes, ...keyed(layout, size) } });
  const resize = (pane: PaneId, by: number) => {
    const layout = group.current?.getLayout();
    if (!layout) return;
    const other = pane === 'chart' ? shown.at(-1) : 'chart';
    if (other === undefined || layout[pane] === undefined || layout[other] === undefined) return;
    group.current?.setLayout({ ...layout, [pane]: layout[pane] + by, [other]: layout[other] - by });
  };
  const sizeMenu = (pane: PaneId) => (
    <Menu
      label={words.paneMenu(words.panes[pane])}
      isIconOnly
      entries={[
        { id: 'wider', label: words.wider, onAction: () => resize(pane, STEP) },
        { id: 'narrower', label: words.narrower, onAction: () => resize(pane, -STEP) },
      ]}
    >
      <span aria-hidden>↔</span>
    </Menu>
  );
  const toggleFoot = () => (isFootOpen ? footnotes.current?.collapse() : footnotes.current?.resize('30%'));
  return (
    <Group orientation="vertical" className="min-h-0 flex-1">
      <Panel id="upper" minSize="35%">
        <Group
          key={shown.join()}
          groupRef={group}
          orientation="horizontal"
          defaultLayout={storedLayout(shown, size)}
          onLayoutChanged={(layout, { isUserInteraction }) => isUserInteraction && remember(layout)}
        >
          {shown.flatMap((pane, i) => [
            ...(i > 0
              ? [<Divider key={`divider-${pane}`} label={words.resize(words.panes[shown[i - 1] ?? pane])} />]
              : []),
            <Panel key={pane} id={pane} minSize={pane === 'chart' ? '30%' : '14%'}>
              {size === 'medium' && pane === 'results' ? (
                <SideSwitch side={side} onSide={setSide} panes={panes} sizeMenu={sizeMenu} />
              ) : (
                panes[pane](sizeMenu(pane), true)
              )}
            </Panel>,
          ])}
        </Group>
      </Panel>
      <Divider label={words.resizeHeight(words.panes.footnotes)} isFlat />
      <Panel
        id="footnotes"
        panelRef={footnotes}
        defaultSize={44}
        minSize="18%"
        collapsible
        collapsedSize={44}
        onResize={({ inPixels }) => setIsFootOpen(inPixels > 60)}
      >
        {panes.footnotes(
          <Button
            look="quiet"
            icon={isFootOpen ? <ChevronDown size={18} aria-hidden /> : <ChevronUp size={18} aria-hidden />}
            aria-expanded={isFootOpen}
            onClick={toggleFoot}
          >
            {isFootOpen ? words.closePane(words.panes.footnotes) : words.openPane(words.panes.footnotes)}
          </Button>,
          isFootOpen,
        )}
      </Panel>
    </Group>
  );
}

interface SideSwitchProps {
  side: 'ledger' | 'results';
  onSide: (side: 'ledger' | 'results') => void;
  panes: PaneContent;
  sizeMenu: (pane: PaneId) => ReactNode;
}

/** Ledger or Results beside the chart. The hidden one stays alive: its calculations go on. */
function SideSwitch({ side, onSide, panes, sizeMenu }: SideSwitchProps) {
  return (
    <div className="flex h-full min-h-0 flex-col">
      <div className="flex shrink-0 gap-1 border-b border-line bg-ground p-1">
        {(['ledger', 'results'] as const).map((pane) => (
          <Button
            key={pane}
            look={pane === side ? 'plain' : 'quiet'}
            aria-pressed={pane === side}
            onClick={() => onSide(pane)}
          >
            {words.panes[pane]}
          </Button>
        ))}
      </div>
      {(['ledger', 'results'] as const).map((pane) => (
        <div key={pane} hidden={pane !== side} className="min-h-0 flex-1">
          {panes[pane](sizeMenu('results'), pane === side)}
        </div>
      ))}
    </div>
  );
}

function SmallLayout({ panes }: { panes: PaneContent }) {
  const [open, setOpen] = useState<PaneId>('chart');
  return (
    <>
      {(Object.keys(words.panes) as PaneId[]).map((pane) => (
        <div key={pane} hidden={pane !== open} className="min-h-0 flex-1">
          {panes[pane](null, pane === open)}
        </div>
      ))}
      <nav aria-label={words.panesLabel} className="flex shrink-0 border-t border-line bg-ground">
        {(Object.keys(words.panes) as PaneId[]).map((pane) => (
          <button
            key={pane}
            type="button"
            aria-current={pane === open ? 'page' : undefined}
            onClick={() => setOpen(pane)}
            className={classNames(
              'min-h-12 min-w-0 flex-1 border-t-2 px-1 text-note sm:text-base',
              pane === open ? 'border-heather font-semibold text-ink' : 'border-transparent text-soft',
            )}
          >
            {words.panes[pane]}
          </button>
        ))}
      </nav>
    </>
  );
}

function Divider({ label, isFlat }: { label: string; isFlat?: boolean }) {
  return (
    <Separator
      aria-label={label}
      className={classNames(
        'group relative shrink-0 bg-line outline-none data-[separator=active]:bg-heather data-[separator=hover]:bg-heather focus-visible:bg-focus',
        isFlat ? 'h-px before:-inset-y-1.5 before:inset-x-0' : 'w-px before:-inset-x-1.5 before:inset-y-0',
        'before:absolute before:z-10 focus-visible:outline-2 focus-visible:outline-focus',
      )}
    />
  );
}

const keyOf = (size: ScreenSize, pane: string) => `sheet.${size}.${pane}`;

function keyed(layout: Layout, size: ScreenSize): Record<string, number> {
  return Object.fromEntries(Object.entries(layout).map(([pane, share]) => [keyOf(size, pane), share]));
}

/** The remembered shares, or the usual ones; they always add up to 100 %. */
function storedLayout(shown: readonly PaneId[], size: ScreenSize): Layout {
  const { paneSizes } = getPreferences();
  const raw = shown.map((pane) => paneSizes[keyOf(size, pane)] ?? WIDTHS[pane] ?? 30);
  const sum = raw.reduce((total, share) => total + share, 0);
  return Object.fromEntries(shown.map((pane, i) => [pane, ((raw[i] ?? 0) * 100) / sum]));
}
