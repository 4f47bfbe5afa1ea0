import { driverFit } from './driver-fit/index.js';
import type { CalculatorDefinition } from './kit/calculator.js';

/** The registry: adding a calculator means adding one folder and one line here. */
export const calculators: readonly CalculatorDefinition[] = [driverFit];

export function calculatorById(id: string): CalculatorDefinition | undefined {
  return calculators.find((calculator) => calculator.id === id);
}
