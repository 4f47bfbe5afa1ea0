import type { z } from 'zod';
import { InputError } from '../../shared/errors.js';
import type { Output } from '../../shared/output.js';
import type { CalculatorDefinition, RoleDeclaration, RoleInput, RoleInputs, RunContext } from './calculator.js';
import { checkedOutput } from './checked-output.js';
import { issueWords } from './issue-words.js';
import { inOrder } from './sweep-order.js';

/** A run that nobody watches and nobody can stop. */
export const SILENT_CONTEXT: RunContext = { progress: () => {}, checkpoint: () => {}, seed: 1 };

/**
 * Runs one calculator: migrates and parses its settings, checks its roles and keys, puts every sweep's rows in order,
 * runs, and checks the answer. The command line, the workers and the server all come through here.
 * Errors: InputError `bad-setting` (a setting, role or key that cannot be used), `missing-input` (a role or key that
 * is not there) and those of an unusable sweep. Never a number that is not finite.
 */
export function runCalculator(
  definition: CalculatorDefinition,
  inputs: RoleInputs,
  settings: Readonly<Record<string, unknown>>,
  context: RunContext = SILENT_CONTEXT,
  settingsVersion: number = definition.settingsVersion,
): Output {
  const parsed = parsedSettings(definition, settings, settingsVersion);
  const output = definition.run(checkedInputs(definition, inputs), parsed, context);
  return checkedOutput(definition, output);
}

/** Settings as the calculator takes them today: older ones migrated step by step, defaults filled in. */
export function parsedSettings<Settings extends z.ZodType>(
  definition: CalculatorDefinition<Settings>,
  settings: Readonly<Record<string, unknown>>,
  settingsVersion: number = definition.settingsVersion,
): z.output<Settings> {
  const result = definition.settings.safeParse(migrated(definition, settings, settingsVersion));
  if (result.success) return result.data;
  const issue = result.error.issues[0];
  const keys = issue?.code === 'unrecognized_keys' ? issue.keys.join(', ') : '';
  const where = keys || (issue?.path.map(String).join('.') ?? '');
  const message = keys
    ? `${definition.title} has no setting named ${keys}. Leave it out, or look up its name.`
    : `The setting ${where || 'list'} cannot be used: ${issueWords(issue)}.`;
  throw new InputError('bad-setting', message, where);
}

function migrated(definition: CalculatorDefinition, settings: Readonly<Record<string, unknown>>, from: number) {
  if (!Number.isInteger(from) || from < 1 || from > definition.settingsVersion) {
    const message = `Settings of version ${from} cannot be read here; the newest known is ${definition.settingsVersion}.`;
    throw new InputError('bad-setting', message, 'settingsVersion');
  }
  let current: Record<string, unknown> = { ...settings };
  for (let version = from; version < definition.settingsVersion; version += 1) {
    const step = definition.migrate[version];
    if (step) current = step(current);
  }
  return current;
}

function checkedInputs(definition: CalculatorDefinition, inputs: RoleInputs): RoleInputs {
  for (const role of Object.keys(inputs)) {
    if (!Object.hasOwn(definition.roles, role)) {
      const known = Object.keys(definition.roles).join(', ');
      throw new InputError('bad-setting', `${definition.title} takes no role ${role}; it takes ${known}.`, role);
    }
  }
  const entries = Object.entries(definition.roles).map(([role, declaration]) => [
    role,
    checkedRole(definition, role, declaration, inputs[role] ?? []),
  ]);
  return Object.fromEntries(entries);
}

function checkedRole(
  definition: CalculatorDefinition,
  role: string,
  declaration: RoleDeclaration,
  given: readonly RoleInput[],
): readonly RoleInput[] {
  const { label, least, most, needs } = declaration;
  if (given.length < least) {
    throw new InputError('missing-input', `${definition.title} needs a sweep for "${label}". Add one.`, role);
  }
  if (given.length > most) {
    const message = `"${label}" takes ${most} at most; there are ${given.length}. Take the others away.`;
    throw new InputError('bad-setting', message, role);
  }
  return given.map((input) => {
    if (!input.sweep && !(input.result && needs === 'sweep-or-result')) {
      throw new InputError('missing-input', `"${label}" needs a sweep.`, role);
    }
    const keys = checkedKeys(role, declaration, input);
    return input.sweep ? { ...input, sweep: inOrder(input.sweep), keys } : { ...input, keys };
  });
}

function checkedKeys(role: string, declaration: RoleDeclaration, input: RoleInput): RoleInput['keys'] {
  const name = input.sweep?.name ?? role;
  for (const [key, { label, unit, required, allowsZero }] of Object.entries(declaration.keys)) {
    const value = input.keys[key];
    const inUnit = unit ? ` in ${unit}` : '';
    if (value === undefined) {
      if (!required) continue;
      const message = `"${declaration.label}" needs the ${label.toLowerCase()} of ${name}${inUnit} (${key}).`;
      throw new InputError('missing-input', message, `${role}.${key}`);
    }
    const isNumber = typeof value === 'number' && Number.isFinite(value);
    if (unit && !(isNumber && (value > 0 || (allowsZero && value === 0)))) {
      const range = allowsZero ? 'of 0 or more' : 'above 0';
      const message = `The ${label.toLowerCase()} of ${name} has to be a number ${range}${inUnit}; it is ${value}.`;
      throw new InputError('bad-setting', message, `${role}.${key}`);
    }
  }
  for (const key of Object.keys(input.keys)) {
    if (Object.hasOwn(declaration.keys, key)) continue;
    throw new InputError('bad-setting', `"${declaration.label}" has no key ${key}. Leave it out.`, `${role}.${key}`);
  }
  return input.keys;
}
