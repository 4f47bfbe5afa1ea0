import { useState } from 'react';
import type { FigureDeclaration } from '../../../calculators/kit/calculator.js';
import type { Figure } from '../../../shared/output.js';
import { formatInterval, formatQuantity, formatUncertain, type QuantityFormat } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { Checkbox } from '../../components/checkbox.js';
import { classNames } from '../../lib/class-names.js';
import { usePreferences } from '../../lib/preferences.js';

const words = text.sheet.results;
const LEAST_SHOWN = 5e-7; // relative: a ± below it would fill the row with digits that nobody can use

interface FiguresTableProps {
  figures: readonly Figure[];
  declared: readonly FigureDeclaration[];
  /** Kept values that no longer follow from what is on the sheet: hatched, still readable. */
  isOutOfDate: boolean;
  caption: string;
}

/** Values with ± or the reason why not. The main ones first; the whole list is one press away. */
export function FiguresTable({ figures, declared, isOutOfDate, caption }: FiguresTableProps) {
  const [showsAll, setShowsAll] = useState(false);
  const [showsStandard, setShowsStandard] = useState(false);
  const [showsDefinitions, setShowsDefinitions] = useState(false);
  const byId = new Map(figures.map((figure) => [figure.id, figure]));
  const known = declared.flatMap((declaration) => {
    const figure = byId.get(declaration.id);
    return figure ? [{ declaration, figure }] : [];
  });
  const main = known.filter(({ declaration }) => declaration.isMain);
  const shown = showsAll || main.length === 0 ? known : main;
  return (
    <div className="flex flex-col gap-2">
      <table className="w-full border-collapse">
        <caption className="sr-only">{caption}</caption>
        <thead className="text-start text-note text-soft">
          <tr>
            <th scope="col" className="py-1 text-start font-normal">
              {words.figure}
            </th>
            <th scope="col" className="py-1 text-end font-normal">
              {words.value}
            </th>
            <th scope="col" className="py-1 ps-3 text-end font-normal">
              {showsStandard ? words.standard : words.plusMinus}
            </th>
          </tr>
        </thead>
        <tbody>
          {shown.map(({ declaration, figure }) => (
            <FigureRow key={figure.id} {...{ declaration, figure, isOutOfDate, showsStandard, showsDefinitions }} />
          ))}
        </tbody>
      </table>
      <div className="flex flex-wrap items-center justify-between gap-x-4">
        {main.length > 0 && (
          <Button look="quiet" className="-ms-3" aria-expanded={showsAll} onClick={() => setShowsAll(!showsAll)}>
            {showsAll ? words.fewerFigures : words.allFigures}
          </Button>
        )}
        <Checkbox
          label={words.showStandard}
          checked={showsStandard}
          onChange={(event) => setShowsStandard(event.target.checked)}
        />
        <Checkbox
          label={words.showDefinitions}
          checked={showsDefinitions}
          onChange={(event) => setShowsDefinitions(event.target.checked)}
        />
      </div>
    </div>
  );
}

interface FigureRowProps {
  declaration: FigureDeclaration;
  figure: Figure;
  isOutOfDate: boolean;
  showsStandard: boolean;
  showsDefinitions: boolean;
}

function FigureRow({ declaration, figure, isOutOfDate, showsStandard, showsDefinitions }: FigureRowProps) {
  const { symbolsFirst, locale, units } = usePreferences();
  const { value, spread } = figureText(figure, showsStandard, { locale: locale ?? undefined, system: units });
  const [first, second] = symbolsFirst
    ? [declaration.symbol, declaration.name]
    : [declaration.name, declaration.symbol];
  return (
    <>
      <tr className="border-t border-line align-baseline">
        <th scope="row" className="py-1 pe-2 text-start font-normal">
          <span>{first}</span> <span className="font-num text-note whitespace-nowrap text-soft">{second}</span>
        </th>
        <td
          className={classNames(
            'py-1 text-end font-num font-semibold whitespace-nowrap',
            isOutOfDate && 'hatched rounded-tag px-1',
          )}
        >
          {value}
        </td>
        <td className="py-1 ps-3 text-end font-num text-note whitespace-nowrap text-soft">{spread}</td>
      </tr>
      {showsDefinitions && (
        <tr>
          <td colSpan={3} className="pb-1 text-note text-soft">
            {declaration.definition} {words.source(declaration.source)}
          </td>
        </tr>
      )}
      {figure.note && (
        <tr>
          <td colSpan={3} className="pb-1 text-note text-soft">
            {figure.note}
          </td>
        </tr>
      )}
    </>
  );
}

/** What stands in the two columns: the value, and ± or the interval's two ends. */
export function figureText(
  figure: Figure,
  showsStandard: boolean,
  format: QuantityFormat,
): { value: string; spread: string } {
  const { value, unit, uncertainty, dof, interval } = figure;
  if (value === null) return { value: '–', spread: words.noValue };
  if (typeof value === 'string') return { value, spread: '' };
  const isExact = uncertainty !== undefined && uncertainty > 0 && uncertainty < LEAST_SHOWN * Math.abs(value);
  if (isExact && !interval) return { value: formatQuantity(value, unit, { ...format, digits: 7 }), spread: words.tiny };
  const written = formatUncertain({ value, uncertainty, dof }, unit, format);
  if (showsStandard) return { value: written.value, spread: written.standard };
  if (interval) {
    const ends = formatInterval(interval.low, interval.high, unit, format);
    return { value: written.value, spread: `${ends} (${words.intervalKind[interval.kind]})` };
  }
  return { value: written.value, spread: written.plusMinus };
}
