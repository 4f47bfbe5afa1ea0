import { useQuery } from '@tanstack/react-query';
import { useWindowVirtualizer } from '@tanstack/react-virtual';
import { useRef } from 'react';
import { Link } from 'react-router-dom';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { MiniCurve } from '../../components/chart/mini-curve.js';
import { StatusWord } from '../../components/status-word.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { pointsQuery } from '../../lib/project-store/store-queries.js';
import { shownQuantity, shownRange } from '../../lib/quantity-words.js';

const { columns } = text.project;
const ROW_PX = 57;

interface SweepTableProps {
  projectId: string;
  sweeps: readonly SweepRow[];
  itemNames: ReadonlyMap<string, string>;
  chosen: ReadonlySet<string>;
  onChoose: (ids: readonly string[], isChosen: boolean) => void;
}

/** The Ledger as a table. Only the rows in view are built, so that thousands scroll. */
export function SweepTable({ projectId, sweeps, itemNames, chosen, onChoose }: SweepTableProps) {
  const frame = useRef<HTMLDivElement>(null);
  const virtual = useWindowVirtualizer({
    count: sweeps.length,
    estimateSize: () => ROW_PX,
    overscan: 20,
    scrollMargin: frame.current?.offsetTop ?? 0,
  });
  const rows = virtual.getVirtualItems();
  const above = Math.max(0, (rows[0]?.start ?? 0) - virtual.options.scrollMargin);
  const below = virtual.getTotalSize() - ((rows.at(-1)?.end ?? 0) - virtual.options.scrollMargin);
  const hasItems = itemNames.size > 0;
  const allChosen = sweeps.length > 0 && sweeps.every(({ id }) => chosen.has(id));
  return (
    <div ref={frame}>
      <table className="w-full border-collapse" aria-rowcount={sweeps.length + 1}>
        <thead>
          <tr className="border-b-2 border-ink text-start align-bottom">
            <th scope="col" className="w-10 text-start">
              <label className="inline-flex min-h-(--control) min-w-8 items-center">
                <span className="sr-only">{text.project.chooseAll}</span>
                <input
                  type="checkbox"
                  className="size-5 accent-heather"
                  checked={allChosen}
                  onChange={(event) =>
                    onChoose(
                      sweeps.map(({ id }) => id),
                      event.target.checked,
                    )
                  }
                />
              </label>
            </th>
            <th scope="col" className="py-2 pe-3 text-start">
              {columns.name}
            </th>
            <th scope="col" className="hidden py-2 pe-3 text-start md:table-cell">
              {columns.curve}
            </th>
            {hasItems && (
              <th scope="col" className="hidden py-2 pe-3 text-start md:table-cell">
                {columns.item}
              </th>
            )}
            <th scope="col" className="hidden py-2 pe-3 text-start sm:table-cell">
              {columns.range}
            </th>
            <th scope="col" className="hidden py-2 text-start xl:table-cell">
              {columns.findings}
            </th>
          </tr>
        </thead>
        <tbody>
          <Gap height={above} />
          {rows.map(({ index, key }) => {
            const sweep = sweeps[index];
            return (
              sweep && (
                <Row
                  key={key}
                  {...{ projectId, sweep, onChoose }}
                  rowIndex={index + 2}
                  isChosen={chosen.has(sweep.id)}
                  itemName={hasItems ? (itemNames.get(sweep.itemId ?? '') ?? '') : undefined}
                />
              )
            );
          })}
          <Gap height={below} />
        </tbody>
      </table>
    </div>
  );
}

function Gap({ height }: { height: number }) {
  return height > 0 ? (
    <tr aria-hidden>
      <td style={{ height }} />
    </tr>
  ) : null;
}

/** What was told of how it was held: "Driver with added mass, 12.5 g". */
export function conditionWords({ conditions }: SweepRow): string {
  const { role, addedMassKg, testVolumeM3 } = conditions;
  if (role === 'sweep') return '';
  const told = [
    addedMassKg === undefined ? '' : shownQuantity(addedMassKg, 'kg'),
    testVolumeM3 === undefined ? '' : shownQuantity(testVolumeM3, 'm³'),
  ].filter(Boolean);
  return [text.project.roles[role], ...told].join(', ');
}

interface RowProps extends Pick<SweepTableProps, 'projectId' | 'onChoose'> {
  sweep: SweepRow;
  rowIndex: number;
  isChosen: boolean;
  itemName: string | undefined;
}
function Row({ projectId, sweep, onChoose, rowIndex, isChosen, itemName }: RowProps) {
  const { id, name, revision } = sweep;
  const { minFrequencyHz, maxFrequencyHz, points, hasPhase, findings } = revision;
  return (
    <tr aria-rowindex={rowIndex} className={isChosen ? 'border-b border-line bg-heather-wash' : 'border-b border-line'}>
      <td>
        <label className="inline-flex min-h-(--control) min-w-8 items-center">
          <span className="sr-only">{text.project.chooseRow(name)}</span>
          <input
            type="checkbox"
            className="size-5 accent-heather"
            checked={isChosen}
            onChange={(event) => onChoose([id], event.target.checked)}
          />
        </label>
      </td>
      <th scope="row" className="py-2 pe-3 text-start font-normal">
        <Link
          to={`/p/${projectId}/sweep/${id}`}
          className="py-0.5 font-medium [overflow-wrap:anywhere] text-heather underline"
        >
          {name}
        </Link>
        <span className="block text-note text-soft">{conditionWords(sweep)}</span>
        <span className="block text-note text-soft sm:hidden">{shownRange(minFrequencyHz, maxFrequencyHz)}</span>
      </th>
      <td className="hidden py-1 pe-3 md:table-cell">
        <RowCurve sweep={sweep} />
      </td>
      {itemName !== undefined && <td className="hidden py-2 pe-3 md:table-cell">{itemName}</td>}
      <td className="hidden py-2 pe-3 whitespace-nowrap sm:table-cell">
        <span className="font-num">{shownRange(minFrequencyHz, maxFrequencyHz)}</span>
        <span className="block text-note text-soft">
          {text.project.points(points)}
          {hasPhase ? '' : `, ${text.project.noPhase}`}
        </span>
      </td>
      <td className="hidden py-2 whitespace-nowrap xl:table-cell">
        <Checks findings={findings} />
      </td>
    </tr>
  );
}

/** The shape of the curve at a glance; fetched only for rows in view. */
function RowCurve({ sweep }: { sweep: SweepRow }) {
  const store = useProjectStore();
  const { data: points } = useQuery(pointsQuery(store, sweep.revision));
  return (
    <div className="h-9 w-24 rounded-tag bg-sheet p-0.5">
      {points && <MiniCurve points={points} label={text.project.curveOf(sweep.name)} className="h-full w-full" />}
    </div>
  );
}

function Checks({ findings }: Pick<SweepRow['revision'], 'findings'>) {
  const worst = findings.find(({ severity }) => severity === 'fault') ?? findings.find((f) => f.severity === 'caution');
  if (findings.length === 0) return <span className="text-note text-soft">{text.project.checksOk}</span>;
  return (
    <StatusWord tone={worst ? (worst.severity === 'fault' ? 'out' : 'old') : 'info'} {...(worst ? { sign: '▲' } : {})}>
      {text.project.remarks(findings.length)}
    </StatusWord>
  );
}
