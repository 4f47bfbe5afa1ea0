import type { SweepConditions } from '../../shared/contracts/sweep.js';
import type { CalculatorDefinition, RoleDeclaration } from './calculator.js';

/** A sweep as far as its place among a calculator's inputs goes. */
export interface Candidate {
  readonly sweepId: string;
  readonly itemId: string | null;
  readonly conditions: SweepConditions;
}
export interface Assignment {
  readonly roles: Readonly<Record<string, readonly AssignedInput[]>>;
  /** Roles that want more sweeps than there are, with how many are missing. */
  readonly missing: readonly { role: string; label: string; count: number }[];
}
export interface AssignedInput {
  readonly sweepId: string;
  readonly keys: Readonly<Record<string, number>>; // SI
}

/** What was told with a sweep, under the key names of the calculators: mass, volume, radiatorMass. */
export function keysOf(conditions: SweepConditions): Record<string, number> {
  const { addedMassKg, testVolumeM3, radiatorMassKg } = conditions;
  return {
    ...(addedMassKg === undefined ? {} : { mass: addedMassKg }),
    ...(testVolumeM3 === undefined ? {} : { volume: testVolumeM3 }),
    ...(radiatorMassKg === undefined ? {} : { radiatorMass: radiatorMassKg }),
  };
}

/**
 * Which of the sweeps plays which role of a calculator: each by the role it was added with. A calculator's first
 * required role that found nobody takes sweeps of no stated role, in their order, so that one dropped file is enough.
 */
export function assignRoles(definition: CalculatorDefinition, candidates: readonly Candidate[]): Assignment {
  const roles: Record<string, AssignedInput[]> = {};
  for (const [role, declaration] of Object.entries(definition.roles)) {
    const named = candidates.filter(
      ({ conditions }) => conditions.role === role && tellsAllKeys(declaration, conditions),
    );
    roles[role] = named.slice(0, declaration.most).map(inputOf);
  }
  const open = Object.entries(definition.roles).find(([role, { least }]) => least > 0 && roles[role]?.length === 0);
  if (open) {
    const unstated = candidates.filter(({ conditions }) => conditions.role === 'sweep');
    roles[open[0]] = unstated.slice(0, open[1].least).map(inputOf);
  }
  const missing = Object.entries(definition.roles).flatMap(([role, { least, label }]) => {
    const count = least - (roles[role]?.length ?? 0);
    return count > 0 ? [{ role, label, count }] : [];
  });
  return { roles, missing };
}

function inputOf({ sweepId, conditions }: Candidate): AssignedInput {
  return { sweepId, keys: keysOf(conditions) };
}

function tellsAllKeys(declaration: RoleDeclaration, conditions: SweepConditions): boolean {
  const told = keysOf(conditions);
  return Object.entries(declaration.keys).every(([key, { required }]) => !required || told[key] !== undefined);
}
