import { canonicalJson } from './canonical-json.js';
import type { CreateResult } from './contracts/result.js';

export type ResultInputs = Pick<
  CreateResult,
  'calculatorId' | 'calculatorVersion' | 'settings' | 'settingsVersion' | 'seed' | 'inputs'
>;

/**
 * Everything that decides a result's digits, and nothing else, as one text: the calculator and its version, settings,
 * seed, and for each input its role, the hash of its points, what was told with it and its prep steps. Names and ids
 * are left out: the same content computed elsewhere has the same identity. `inputsSha256` is the sha-256 of this text.
 */
export function resultIdentity(result: ResultInputs): string {
  const { calculatorId, calculatorVersion, settings, settingsVersion, seed, inputs } = result;
  return canonicalJson({
    calculatorId,
    calculatorVersion,
    settings,
    settingsVersion,
    seed,
    inputs: inputs.map(({ role, pointsSha256, keys, prepSteps }) => ({ role, pointsSha256, keys, prepSteps })),
  });
}
