import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { Output, Table } from '../../../shared/output.js';
import { formatPlain, formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { MisfitPlot } from '../../components/chart/misfit-plot.js';
import { usePreferences } from '../../lib/preferences.js';
import { Fold } from './fold.js';
import { HowMade } from './how-made.js';
import type { CardState } from './use-card.js';

const words = text.sheet.results;

interface CardDetailsProps {
  definition: CalculatorDefinition;
  cardState: CardState;
  output: Output;
}

/** Behind the figures: misfit, the calculator's tables, correlations, and how this was made. */
export function CardDetails({ definition, cardState, output }: CardDetailsProps) {
  const residuals = output.traces.filter(({ axis }) => axis === 'residual');
  return (
    <>
      {(output.fit || residuals.length > 0) && (
        <Fold title={words.misfit}>
          <div className="flex flex-col gap-3">
            {output.fit && <FitSentence output={output} />}
            {residuals.length > 0 && <MisfitPlot traces={residuals} />}
          </div>
        </Fold>
      )}
      {output.tables.map((table) => (
        <Fold key={table.id} title={table.title}>
          <OutputTable table={table} />
        </Fold>
      ))}
      {output.fit && output.fit.parameters.length > 1 && (
        <Fold title={words.correlations}>
          <Correlations fit={output.fit} />
        </Fold>
      )}
      <Fold title={words.howMade}>
        <HowMade definition={definition} cardState={cardState} />
      </Fold>
    </>
  );
}

function FitSentence({ output }: { output: Output }) {
  const { locale } = usePreferences();
  if (!output.fit) return null;
  const { status, model, residual, atBound } = output.fit;
  const percent = `${formatPlain(residual * 100, 2, locale ?? undefined)} %`;
  return (
    <p>
      {words.fit[status]} {words.model(model)} {words.misfitSentence(percent)}
      {atBound.length > 0 && ` ${words.atBound(atBound.join(', '))}`}
    </p>
  );
}

/** A calculator's own table: typed columns, units in the heads, numbers to the right. */
export function OutputTable({ table }: { table: Table }) {
  const { locale, units } = usePreferences();
  const format = { locale: locale ?? undefined, system: units };
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a table that scrolls sideways must be scrollable by keys
    <section className="overflow-x-auto" tabIndex={0} aria-label={table.title}>
      <table className="w-full border-collapse">
        <thead>
          <tr>
            {table.columns.map(({ id, label, kind }) => (
              <th key={id} scope="col" className={`py-1 pe-3 text-note font-normal text-soft ${side(kind)}`}>
                {label}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row) => (
            <tr key={JSON.stringify(row)} className="border-t border-line align-baseline">
              {table.columns.map(({ id, kind, unit }) => {
                const value = row[id] ?? null;
                const written =
                  typeof value === 'number'
                    ? formatQuantity(value, unit ?? '', format)
                    : typeof value === 'boolean'
                      ? value
                        ? words.yes
                        : words.no
                      : (value ?? '–');
                return (
                  <td
                    key={id}
                    className={`py-1 pe-3 ${kind === 'number' ? 'font-num whitespace-nowrap' : ''} ${side(kind)}`}
                  >
                    {written}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

const side = (kind: string) => (kind === 'number' ? 'text-end' : 'text-start');

function Correlations({ fit }: { fit: NonNullable<Output['fit']> }) {
  const { locale } = usePreferences();
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a table that scrolls sideways must be scrollable by keys
    <section className="overflow-x-auto" tabIndex={0} aria-label={words.correlations}>
      <table className="border-collapse font-num text-note">
        <thead>
          <tr>
            <td />
            {fit.parameters.map((name) => (
              <th key={name} scope="col" className="px-2 py-1 text-end font-normal text-soft">
                {name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {fit.parameters.map((name, i) => (
            <tr key={name} className="border-t border-line">
              <th scope="row" className="py-1 pe-2 text-start font-normal text-soft">
                {name}
              </th>
              {fit.parameters.map((other, j) => {
                const value = fit.correlations[i]?.[j] ?? 0;
                const isStrong = i !== j && Math.abs(value) > 0.95;
                return (
                  <td key={other} className={`px-2 py-1 text-end ${isStrong ? 'font-semibold text-old' : ''}`}>
                    {formatPlain(Math.round(value * 100) / 100, 2, locale ?? undefined)}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
