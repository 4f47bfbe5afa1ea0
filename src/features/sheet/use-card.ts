import { useEffect } from 'react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { Result } from '../../../shared/contracts/result.js';
import type { Card } from '../../../shared/contracts/sheet.js';
import type { Output } from '../../../shared/output.js';
import { useAddRow } from '../../lib/project-store/store-mutations.js';
import { cardIdentityParts, cardInputs, keptResult, type StaleReason, staleReasons } from './card-inputs.js';
import { useSheetScene } from './sheet-context.js';
import { changeCard } from './sheet-edits.js';
import { outputOf, useCalculatorRun } from './use-calculator-run.js';

/** A card as it stands: what it shows, whether that is kept, and why it may be out of date. */
export function useCard(card: Card, definition: CalculatorDefinition) {
  const { sheetId, state, sweeps, results, areResultsHere, points, setOverlay } = useSheetScene();
  const { inputs, isAnyMissing } = cardInputs(card, definition, sweeps);
  const isComplete = Object.entries(definition.roles).every(
    ([role, { least }]) => (card.inputs[role]?.length ?? 0) >= least,
  );
  const parts = cardIdentityParts(card, definition, inputs);
  const kept: Result | undefined = results.find(({ id }) => id === card.resultId);
  const run = useCalculatorRun({
    definition,
    parts,
    inputs,
    points,
    areInputsHere: isComplete && !isAnyMissing,
    isAutomatic: definition.quick && !kept && (card.resultId === null || areResultsHere),
  });
  const reasons: StaleReason[] = kept ? staleReasons(kept, parts) : [];
  const output: Output | undefined = kept ? kept.output : outputOf(run.state);
  const keeping = useAddRow('results');
  const itemId = inputs.find(({ sweep }) => sweep.itemId !== null)?.sweep.itemId ?? null;

  useEffect(() => {
    setOverlay(card.id, output);
    return () => setOverlay(card.id, undefined);
  }, [card.id, output, setOverlay]);

  return {
    inputs,
    parts,
    kept,
    reasons,
    output,
    run: run.state,
    isComplete,
    isAnyMissing,
    /** What is shown is what the card asks now; else it is hatched. */
    isCurrent: kept ? reasons.length === 0 : run.isCurrent,
    stop: run.stop,
    /** Computes anew what the card asks now. A kept result stays where it was; the card lets go of it. */
    runAgain: () => {
      if (card.resultId !== null) state.edit(changeCard(card.id, { resultId: null }));
      if (card.resultId === null || !run.isCurrent) run.run();
    },
    canKeep: run.isCurrent && !kept,
    isKeeping: keeping.isPending,
    keepError: keeping.error,
    keep: () => {
      if (run.state.kind !== 'done' || !run.isCurrent) return;
      keeping.mutate(keptResult(parts, sheetId, itemId, run.state.output), {
        onSuccess: (result) => state.edit(changeCard(card.id, { resultId: result.id })),
      });
    },
  };
}
export type CardState = ReturnType<typeof useCard>;
