import { keysOf } from '../../../calculators/kit/assign-roles.js';
import type { CalculatorDefinition, RoleInputs } from '../../../calculators/kit/calculator.js';
import type { CreateResult, OutOfDateReason, Result } from '../../../shared/contracts/result.js';
import type { Card } from '../../../shared/contracts/sheet.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import type { Output } from '../../../shared/output.js';
import type { Points } from '../../../shared/points.js';
import { type ResultInputs, resultIdentity } from '../../../shared/result-identity.js';

export const SEED = 1;

/** One sweep in one role, with its row and everything that was told: with the sweep, or on the card instead. */
export interface CardInput {
  readonly role: string;
  readonly sweep: SweepRow;
  readonly keys: Readonly<Record<string, number | string>>;
}

/** The inputs of a card, and whether a sweep among them is missing: in the bin, or not yet fetched. */
export function cardInputs(card: Card, definition: CalculatorDefinition, sweeps: readonly SweepRow[]) {
  const byId = new Map(sweeps.map((sweep) => [sweep.id, sweep]));
  const asked = Object.entries(card.inputs).flatMap(([role, list]) => list.map((input) => ({ role, ...input })));
  const inputs = asked.flatMap(({ role, sweepId, keys }): CardInput[] => {
    const sweep = byId.get(sweepId);
    return sweep ? [{ role, sweep, keys: { ...toldKeys(definition, role, sweep), ...keys } }] : [];
  });
  return { inputs, isAnyMissing: inputs.length < asked.length };
}

/** What was told with a sweep, as far as this role asks for it. */
export function toldKeys(definition: CalculatorDefinition, role: string, sweep: SweepRow): Record<string, number> {
  const wanted = definition.roles[role]?.keys ?? {};
  return Object.fromEntries(Object.entries(keysOf(sweep.conditions)).filter(([key]) => Object.hasOwn(wanted, key)));
}

/** Everything that decides the digits of a card's run: the same as of the result that would be kept. */
export function cardIdentityParts(
  card: Card,
  definition: CalculatorDefinition,
  inputs: readonly CardInput[],
): ResultInputs {
  return {
    calculatorId: definition.id,
    calculatorVersion: definition.version,
    settings: card.settings,
    settingsVersion: definition.settingsVersion,
    seed: SEED,
    inputs: inputs.map(({ role, sweep, keys }) => ({
      role,
      sweepId: sweep.id,
      revisionId: sweep.revision.id,
      pointsSha256: sweep.revision.pointsSha256,
      keys: { ...keys },
      prepSteps: [],
    })),
  };
}

export function roleInputs(inputs: readonly CardInput[], points: ReadonlyMap<string, Points>): RoleInputs | null {
  const roles: Record<string, RoleInputs[string][number][]> = {};
  for (const { role, sweep, keys } of inputs) {
    const own = points.get(sweep.revision.pointsSha256);
    if (!own) return null;
    const planes = {
      frequencyHz: own.frequencyHz,
      ...(own.realOhm && own.imaginaryOhm ? { realOhm: own.realOhm, imaginaryOhm: own.imaginaryOhm } : {}),
      ...(own.magnitudeOhm ? { magnitudeOhm: own.magnitudeOhm } : {}),
    };
    roles[role] = [
      ...(roles[role] ?? []),
      { sweep: { name: sweep.name, ...planes, conditions: sweep.conditions }, keys },
    ];
  }
  return roles;
}

/** Why a kept result no longer says what the card asks, in the order a person would look. Empty while it is current. */
export type StaleReason = OutOfDateReason['what'] | 'inputs';
export function staleReasons(result: Result, parts: ResultInputs): StaleReason[] {
  const reasons = new Set<StaleReason>(result.outOfDate.map(({ what }) => what));
  if (resultIdentity(result) === resultIdentity(parts)) return [...reasons];
  if (result.calculatorVersion !== parts.calculatorVersion) reasons.add('calculator');
  if (JSON.stringify(sorted(result.settings)) !== JSON.stringify(sorted(parts.settings))) reasons.add('settings');
  const asked = new Map(parts.inputs.map((input) => [`${input.role} ${input.sweepId}`, input]));
  const isOther = (input: Result['inputs'][number]) => {
    const now = asked.get(`${input.role} ${input.sweepId}`);
    return !now || JSON.stringify(sorted(now.keys)) !== JSON.stringify(sorted(input.keys));
  };
  if (result.inputs.length !== parts.inputs.length || result.inputs.some(isOther)) reasons.add('inputs');
  else if (result.inputs.some((i) => asked.get(`${i.role} ${i.sweepId}`)?.pointsSha256 !== i.pointsSha256))
    reasons.add('reading');
  return [...reasons];
}

function sorted(value: Readonly<Record<string, unknown>>): [string, unknown][] {
  return Object.entries(value)
    .filter(([, part]) => part !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1));
}

/** The result that "Keep" stores: typed arrays become lists. */
export function keptResult(parts: ResultInputs, sheetId: string, itemId: string | null, output: Output): CreateResult {
  const traces = output.traces.map(({ x, y, re, im, ...rest }) => ({
    ...rest,
    x: Array.from(x),
    ...(y ? { y: Array.from(y) } : {}),
    ...(re ? { re: Array.from(re) } : {}),
    ...(im ? { im: Array.from(im) } : {}),
  }));
  return { name: '', sheetId, itemId, setupVersionId: null, ...parts, output: { ...output, traces } };
}
