import { Plus } from 'lucide-react';
import type { ReactNode } from 'react';
import { calculatorById, calculators } from '../../../calculators/index.js';
import { assignRoles } from '../../../calculators/kit/assign-roles.js';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { EmptyState } from '../../components/empty-state.js';
import { CalculatorCard } from './calculator-card.js';
import { Pane } from './pane.js';
import { useSheetScene } from './sheet-context.js';
import { addCard } from './sheet-edits.js';

const words = text.sheet.results;

/** One card per calculator; while there is none, those that fit what is drawn, and what the others still miss. */
export function ResultsPane({ sizeMenu }: { sizeMenu: ReactNode }) {
  const { state } = useSheetScene();
  const { cards } = state.content;
  return (
    <Pane id="results" title={text.sheet.panes.results} actions={sizeMenu}>
      <div className="flex flex-col gap-8 p-3">
        {cards.map((card) => {
          const definition = calculatorById(card.calculatorId);
          return definition && <CalculatorCard key={card.id} card={card} definition={definition} />;
        })}
        <Suggestions isEmpty={cards.length === 0} />
      </div>
    </Pane>
  );
}

function Suggestions({ isEmpty }: { isEmpty: boolean }) {
  const { state, sweeps, readOnlyReason } = useSheetScene();
  const drawn = state.content.drawn.flatMap(({ sweepId }) => sweeps.find(({ id }) => id === sweepId) ?? []);
  const offers = calculators.map((definition) => ({ definition, fit: fitOf(definition, drawn) }));
  const buttons = offers.map(({ definition, fit }) => (
    <div key={definition.id} className="flex flex-col items-center gap-1">
      <Button
        icon={<Plus size={18} aria-hidden />}
        reason={readOnlyReason ?? fit.missing}
        onClick={() =>
          state.edit(
            addCard({
              id: crypto.randomUUID(),
              calculatorId: definition.id,
              inputs: fit.inputs,
              settings: {},
              setupVersionId: null,
              resultId: null,
            }),
          )
        }
      >
        {words.addCard(definition.title)}
      </Button>
      {fit.missing && isEmpty && <p className="text-note text-soft">{fit.missing}</p>}
    </div>
  ));
  if (!isEmpty) return <div className="flex flex-wrap gap-2">{buttons}</div>;
  return (
    <EmptyState title={words.empty} action={buttons}>
      {emptyWords(
        drawn.length,
        offers.some(({ fit }) => !fit.missing),
      )}
    </EmptyState>
  );
}

function fitOf(definition: CalculatorDefinition, drawn: readonly SweepRow[]) {
  const candidates = drawn.map(({ id, itemId, conditions }) => ({ sweepId: id, itemId, conditions }));
  const { roles, missing } = assignRoles(definition, candidates);
  const inputs = Object.fromEntries(
    Object.entries(roles).map(([role, list]) => [role, list.map(({ sweepId }) => ({ sweepId, keys: {} }))]),
  );
  const what = missing.map(({ label }) => label).join(', ');
  return { inputs, missing: what ? words.missing(what) : undefined };
}

function emptyWords(drawnCount: number, isAnyFit: boolean): string {
  if (drawnCount === 0) return text.sheet.chart.nothingDrawnHelp;
  return isAnyFit ? words.emptyHelp : words.noneFits;
}
