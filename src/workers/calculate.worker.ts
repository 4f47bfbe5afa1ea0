import { expose } from 'comlink';
import { calculatorById } from '../../calculators/index.js';
import { runCalculator } from '../../calculators/kit/run.js';
import { InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import type { CalculateAnswer, CalculateRequest, OnProgress } from './messages.js';

const PROGRESS_EVERY_MS = 50;

/** Calls on at most every 50 ms, so that a fine-grained calculator does not flood the page. */
function thinned(onProgress: OnProgress): OnProgress {
  let last = 0;
  return (done, total, label) => {
    const now = performance.now();
    if (now - last < PROGRESS_EVERY_MS && done < total) return;
    last = now;
    onProgress(done, total, label);
  };
}

/** Runs one calculator. Stop is not asked for in here: the page terminates the worker. */
function calculate(request: CalculateRequest, onProgress: OnProgress): CalculateAnswer {
  const { calculatorId, inputs, settings, settingsVersion, seed = 1 } = request;
  const definition = calculatorById(calculatorId);
  if (!definition) {
    const message = text.errors.noCalculator(calculatorId);
    return { ok: false, refusal: new InputError('bad-setting', message, 'calculatorId').toJSON() };
  }
  try {
    const context = { progress: thinned(onProgress), checkpoint: () => {}, seed };
    return { ok: true, value: runCalculator(definition, inputs, settings, context, settingsVersion) };
  } catch (error) {
    if (error instanceof InputError) return { ok: false, refusal: error.toJSON() };
    throw error;
  }
}

const calculatorApi = { calculate };
export type CalculatorApi = typeof calculatorApi;
expose(calculatorApi);
