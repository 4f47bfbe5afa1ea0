import { useCallback, useEffect, useRef, useState } from 'react';
import type { CalculatorDefinition } from '../../../calculators/kit/calculator.js';
import type { Output } from '../../../shared/output.js';
import type { Points } from '../../../shared/points.js';
import { type ResultInputs, resultIdentity } from '../../../shared/result-identity.js';
import { calculateInWorker } from '../../workers/pool.js';
import { type Job, JobStopped } from '../../workers/worker-pool.js';
import { type CardInput, roleInputs } from './card-inputs.js';

const RUN_AFTER_MS = 400;
const MOST_REMEMBERED = 40;

export interface RunProgress {
  readonly done: number;
  readonly total: number;
  readonly label: string | undefined;
  readonly startedAt: number;
}
export type RunState =
  | { readonly kind: 'waiting' } // inputs are missing or still on their way
  | { readonly kind: 'running'; readonly progress: RunProgress; readonly before: Output | undefined }
  | { readonly kind: 'stopped'; readonly before: Output | undefined }
  | { readonly kind: 'failed'; readonly error: unknown; readonly before: Output | undefined }
  | { readonly kind: 'done'; readonly output: Output; readonly identity: string };

/** What ran in this tab, by everything that decides its digits: drawing a sheet again runs nothing twice. */
const remembered = new Map<string, Output>();
function remember(identity: string, output: Output): void {
  remembered.delete(identity);
  remembered.set(identity, output);
  const oldest = remembered.keys().next().value;
  if (remembered.size > MOST_REMEMBERED && oldest !== undefined) remembered.delete(oldest);
}

interface Wanted {
  readonly definition: CalculatorDefinition;
  readonly parts: ResultInputs;
  readonly inputs: readonly CardInput[];
  readonly points: ReadonlyMap<string, Points>;
  /** Runs by itself after a change; without it, only when asked. */
  readonly isAutomatic: boolean;
}

/** Runs a card's calculator in a worker, 400 ms after the last change; Stop ends the worker itself. */
export function useCalculatorRun({ definition, parts, inputs, points, isAutomatic }: Wanted) {
  const [state, setState] = useState<RunState>({ kind: 'waiting' });
  const job = useRef<Job<Output>>(undefined);
  const identity = resultIdentity(parts);
  const wanted = useRef({ parts, inputs, points });
  wanted.current = { parts, inputs, points };
  const isComplete = Object.entries(definition.roles).every(
    ([role, { least }]) => inputs.filter((input) => input.role === role).length >= least,
  );
  const isReady = isComplete && inputs.every(({ sweep }) => points.has(sweep.revision.pointsSha256));

  const run = useCallback(() => {
    const { parts: asked, inputs: given, points: known } = wanted.current;
    const roles = roleInputs(given, known);
    if (!roles) return;
    job.current?.stop();
    const startedAt = performance.now();
    const showProgress = (done: number, total: number, label?: string) =>
      setState((now) => ({ kind: 'running', progress: { done, total, label, startedAt }, before: outputOf(now) }));
    showProgress(0, 1);
    const { settings, settingsVersion, seed } = asked;
    const own = calculateInWorker(
      { calculatorId: definition.id, inputs: roles, settings, settingsVersion, seed },
      (done, total, label) => job.current === own && showProgress(done, total, label),
    );
    job.current = own;
    const made = resultIdentity(asked);
    own.done.then(
      (output) => {
        remember(made, output);
        if (job.current === own) setState({ kind: 'done', output, identity: made });
      },
      (error: unknown) => {
        if (job.current !== own) return;
        const isStop = error instanceof JobStopped;
        setState((now) =>
          isStop ? { kind: 'stopped', before: outputOf(now) } : { kind: 'failed', error, before: outputOf(now) },
        );
      },
    );
  }, [definition]);

  useEffect(() => {
    const known = remembered.get(identity);
    if (known) {
      job.current = undefined;
      setState({ kind: 'done', output: known, identity });
      return;
    }
    if (!isReady) {
      setState({ kind: 'waiting' });
      return;
    }
    if (!isAutomatic) return;
    const timer = setTimeout(run, RUN_AFTER_MS);
    return () => clearTimeout(timer);
  }, [identity, isReady, isAutomatic, run]);

  useEffect(() => () => job.current?.stop(), []);
  const stop = useCallback(() => job.current?.stop(), []);
  return { state, run, stop };
}

export function outputOf(state: RunState): Output | undefined {
  if (state.kind === 'done') return state.output;
  return state.kind === 'waiting' ? undefined : state.before;
}
