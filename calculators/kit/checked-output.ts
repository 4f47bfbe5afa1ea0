import { type Output, OutputSchema } from '../../shared/output.js';
import type { CalculatorDefinition } from './calculator.js';

/**
 * The answer, if it has the one shape of every answer: only declared figures, each once, every number finite, every
 * curve as long as its frequencies. Anything else is a defect of the calculator, so it throws a plain Error that
 * names the place.
 */
export function checkedOutput(definition: CalculatorDefinition, output: Output): Output {
  const parsed = OutputSchema.safeParse(output);
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    throw new Error(`${definition.id}: ${issue?.path.join('.') ?? 'output'}: ${issue?.message ?? 'not an output'}`);
  }
  const declared = new Set(definition.figures.map(({ id }) => id));
  for (const { id } of output.figures) {
    if (!declared.delete(id)) throw new Error(`${definition.id}: figure ${id} is not declared, or stands there twice`);
  }
  for (const { id, x, y, re, im } of output.traces) {
    const curves = [y, re, im].filter((curve) => curve !== undefined);
    if (curves.length === 0 || curves.some((curve) => curve.length !== x.length)) {
      throw new Error(`${definition.id}: trace ${id} has no value for each x`);
    }
    if ([x, ...curves].some(hasGap)) throw new Error(`${definition.id}: trace ${id} holds a value that is not finite`);
  }
  return output;
}

function hasGap(curve: ArrayLike<number>): boolean {
  for (let i = 0; i < curve.length; i += 1) {
    if (!Number.isFinite(curve[i])) return true;
  }
  return false;
}
