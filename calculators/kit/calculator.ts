import type { z } from 'zod';
import type { Output } from '../../shared/output.js';
import type { Sweep } from './sweep.js';

/** How many inputs a role takes; `needs: 'sweep-or-result'` also takes an earlier result (role `driver`). */
export interface RoleDeclaration {
  readonly label: string; // "Add as free air", in the words of the screen
  readonly help: string; // what to do before such a sweep
  readonly least: number;
  readonly most: number;
  readonly needs: 'sweep' | 'sweep-or-result';
  readonly keys: Readonly<Record<string, RoleKey>>; // what is told with it: mass, volume, …
}
export interface RoleKey {
  readonly label: string;
  readonly unit: string; // SI
  readonly required: boolean;
  readonly allowsZero?: boolean; // a number has to be above 0 unless this is set
}

/** A figure a calculator can return: what stands in its help, its tables and its exports. */
export interface FigureDeclaration {
  readonly id: string; // fs
  readonly symbol: string; // fs
  readonly name: string; // Resonance
  readonly unit: string; // Hz
  readonly definition: string;
  readonly source: string;
  readonly isMain?: boolean; // shown at first; the rest is one press away
}

/** What a role was given. Exactly one of sweep and result is present. */
export interface RoleInput {
  readonly sweep?: Sweep;
  readonly result?: Output;
  readonly keys: Readonly<Record<string, number | string>>; // SI
}
export type RoleInputs = Readonly<Record<string, readonly RoleInput[]>>;

export interface RunContext {
  /** Tells how far the work is: done of total, and what is in hand. Cheap: call it freely. */
  progress(done: number, total: number, label?: string): void;
  /** Called between steps of long work; a host that has to end the run throws here. */
  checkpoint(): void;
  readonly seed: number; // for whatever is random: the same seed gives the same digits
}

export interface CalculatorDefinition<Settings extends z.ZodType = z.ZodType> {
  readonly id: string;
  readonly version: number; // raised on any change of results
  readonly title: string;
  readonly summary: string;
  readonly quick: boolean; // median under 2 s: runs by itself after a change
  readonly roles: Readonly<Record<string, RoleDeclaration>>;
  readonly settings: Settings; // label, unit, range, default and help text on each field, by `.meta()`
  readonly settingsVersion: number;
  /** From settings of version k to version k + 1. */
  readonly migrate: Readonly<Record<number, (old: Record<string, unknown>) => Record<string, unknown>>>;
  readonly figures: readonly FigureDeclaration[];
  run(inputs: RoleInputs, settings: z.output<Settings>, context: RunContext): Output;
}

/** What stands on a settings field by `.meta()`: the form on the screen is made from it. */
export interface FieldMeta {
  readonly label: string;
  readonly help: string;
  readonly unit?: string; // SI; the screen converts
  readonly group?: string; // heading in the form
}

export function defineCalculator<Settings extends z.ZodType>(
  definition: CalculatorDefinition<Settings>,
): CalculatorDefinition<Settings> {
  return definition;
}
