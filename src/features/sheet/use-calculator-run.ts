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
  | { readonly kind: 'waiting'; readonly before: Output | undefined } // inputs are missing or still on their way
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
  /** Every input is here: nothing is missing, nothing in the bin. */
  readonly areInputsHere: boolean;
  /** Runs by itself after a change; without it, only when asked. */
  readonly isAutomatic: boolean;
}

/** Runs a card's calculator in a worker, 400 ms after the last change; Stop ends the worker itself. */
export function useCalculatorRun({ definition, parts, inputs, points, areInputsHere, isAutomatic }: Wanted) {
  const [state, setState] = useState<RunState>({ kind: 'waiting', before: undefined });
  const job = useRef<Job<Output>>(undefined);
  const runningIdentity = useRef('');
  const identity = resultIdentity(parts);
  const wanted = useRef({ parts, inputs, points });
  wanted.current = { parts, inputs, points };
  const isReady = areInputsHere && inputs.every(({ sweep }) => points.has(sweep.revision.pointsSha256));

  /** Ends what runs, without a word: something else has taken its place. */
  const drop = useCallback(() => {
    const old = job.current;
    job.current = undefined;
    runningIdentity.current = '';
    old?.stop();
  }, []);

  const run = useCallback(() => {
    const { parts: asked, inputs: given, points: known } = wanted.current;
    const roles = roleInputs(given, known);
    if (!roles) return;
    drop();
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
    runningIdentity.current = made;
    own.done.then(
      (output) => {
        remember(made, output);
        if (job.current !== own) return;
        runningIdentity.current = '';
        setState({ kind: 'done', output, identity: made });
      },
      (error: unknown) => {
        if (job.current !== own) return;
        runningIdentity.current = '';
        setState((now) => endedBy(error, outputOf(now)));
      },
    );
  }, [definition, drop]);

  useEffect(() => {
    if (runningIdentity.current === identity) return;
    drop();
    const known = remembered.get(identity);
    if (known) setState({ kind: 'done', output: known, identity });
    else if (!isReady) setState((now) => ({ kind: 'waiting', before: outputOf(now) }));
    else if (isAutomatic) {
      const timer = setTimeout(run, RUN_AFTER_MS);
      return () => clearTimeout(timer);
    }
  }, [identity, isReady, isAutomatic, run, drop]);

  useEffect(() => drop, [drop]);
  const stop = useCallback(() => job.current?.stop(), []);
  /** The output on show follows from what the card asks now. */
  const isCurrent = state.kind === 'done' && state.identity === identity;
  return { state, run, stop, isCurrent };
}

function endedBy(error: unknown, before: Output | undefined): RunState {
  return error instanceof JobStopped ? { kind: 'stopped', before } : { kind: 'failed', error, before };
}

export function outputOf(state: RunState): Output | undefined {
  return state.kind === 'done' ? state.output : state.before;
}
