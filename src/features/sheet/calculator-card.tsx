import { MoreVertical, Play, Square } from 'lucide-react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { Card } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { ErrorBar } from '../../components/error-bar.js';
import { Findings } from '../../components/findings.js';
import { Menu } from '../../components/menu.js';
import { StatusWord } from '../../components/status-word.js';
import { shortDate } from '../../lib/dates.js';
import { CardDetails } from './card-details.js';
import { CardInputsForm } from './card-inputs-form.js';
import { CardSettings } from './card-settings.js';
import { FiguresTable } from './figures-table.js';
import { Fold } from './fold.js';
import { RunProgressLine } from './run-progress-line.js';
import { useSheetScene } from './sheet-context.js';
import { changeCard, removeCard } from './sheet-edits.js';
import { type CardState, useCard } from './use-card.js';

const words = text.sheet.results;

/** One calculator on the sheet: status in words, values with ±, findings, and everything behind them. */
export function CalculatorCard({ card, definition }: { card: Card; definition: CalculatorDefinition }) {
  const { state, setCursorA, readOnlyReason } = useSheetScene();
  const cardState = useCard(card, definition);
  const { output, run } = cardState;
  return (
    <article
      aria-label={definition.title}
      data-card={card.id}
      className="flex flex-col gap-3 border-t-2 border-ink pt-2"
    >
      <div className="flex items-start justify-between gap-2">
        <div className="min-w-0">
          <h3 className="text-read font-semibold">{definition.title}</h3>
          <CardStatus cardState={cardState} />
        </div>
        <div className="flex shrink-0 items-center gap-1">
          <RunButton cardState={cardState} />
          <Menu
            label={words.cardMenu(definition.title)}
            isIconOnly
            entries={[
              {
                id: 'remove',
                label: words.remove,
                isDanger: true,
                isDisabled: readOnlyReason !== undefined,
                onAction: () => state.edit(removeCard(card.id)),
              },
            ]}
          >
            <MoreVertical size={18} aria-hidden />
          </Menu>
        </div>
      </div>
      {run.kind === 'running' && <RunProgressLine progress={run.progress} />}
      {run.kind === 'failed' && <ErrorBar error={run.error} />}
      {cardState.keepError && <ErrorBar error={cardState.keepError} />}
      {output?.summary && <p className="max-w-prose text-read">{output.summary}</p>}
      {output && (
        <FiguresTable
          figures={output.figures}
          declared={definition.figures}
          isOutOfDate={!cardState.isCurrent}
          caption={`${definition.title}: ${words.figures}`}
        />
      )}
      {output && (
        <Fold title={words.findings} isOpenAtFirst>
          {output.findings.length === 0 ? (
            <p className="text-soft">{words.noFindings}</p>
          ) : (
            <Findings findings={output.findings} onFrequency={setCursorA} />
          )}
        </Fold>
      )}
      <Fold title={words.inputs} isOpenAtFirst={!cardState.isComplete}>
        <CardInputsForm
          card={card}
          definition={definition}
          onInputs={(inputs) => state.edit(changeCard(card.id, { inputs }), `inputs ${card.id}`)}
        />
      </Fold>
      <Fold title={words.settings}>
        <CardSettings
          card={card}
          definition={definition}
          onSettings={(settings) =>
            state.edit(changeCard(card.id, { settings: { ...settings } }), `settings ${card.id}`)
          }
        />
      </Fold>
      {output && <CardDetails definition={definition} cardState={cardState} output={output} />}
    </article>
  );
}

/** Kept, not kept, out of date with what changed, waiting for inputs: always in words. */
function CardStatus({ cardState }: { cardState: CardState }) {
  const { readOnlyReason } = useSheetScene();
  const { kept, reasons, run, isComplete, isAnyMissing, canKeep, isKeeping, keep } = cardState;
  if (kept && reasons.length > 0) {
    const what = reasons.map((reason) => words.reasons[reason]).join(', ');
    return <StatusWord tone="old">{words.outOfDateBecause(what)}</StatusWord>;
  }
  if (kept) {
    return (
      <span className="flex flex-wrap items-center gap-2 text-note text-soft">
        <StatusWord tone="within">{words.kept}</StatusWord>
        {words.keptAt(shortDate(kept.createdAt), kept.createdBy.name)}
      </span>
    );
  }
  if (isAnyMissing) return <StatusWord tone="old">{words.sweepMissing}</StatusWord>;
  if (!isComplete) return <StatusWord tone="plain">{words.noInputs}</StatusWord>;
  return (
    <span className="flex flex-wrap items-center gap-2">
      <StatusWord tone="plain">{run.kind === 'stopped' ? words.stopped : words.notKept}</StatusWord>
      {canKeep && (
        <Button look="quiet" isBusy={isKeeping} reason={readOnlyReason} onClick={keep}>
          {words.keep}
        </Button>
      )}
    </span>
  );
}

function RunButton({ cardState }: { cardState: CardState }) {
  const { run, isComplete, stop, runAgain, output } = cardState;
  if (run.kind === 'running') {
    return (
      <Button data-stop icon={<Square size={16} aria-hidden />} onClick={stop}>
        {words.stop}
      </Button>
    );
  }
  return (
    <Button
      data-run
      icon={<Play size={16} aria-hidden />}
      reason={isComplete ? undefined : words.noInputs}
      onClick={runAgain}
    >
      {output ? words.runAgain : words.run}
    </Button>
  );
}
