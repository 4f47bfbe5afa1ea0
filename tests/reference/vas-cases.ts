import { driverFit } from '../../calculators/driver-fit/index.js';
import { runCalculator } from '../../calculators/kit/run.js';
import type { Output } from '../../shared/output.js';
import { figureId, type ReferenceCase, referenceInputs, referenceSettings } from './reference-cases.js';

/** What is wrong with the answer to a case: figures outside their tolerance, findings missing, findings nobody listed. */
export function defectsOf(folder: string, item: ReferenceCase, isModelTold: boolean): string[] {
  const output = runCalculator(driverFit, referenceInputs(folder, item), referenceSettings(item, isModelTold));
  return [...figureDefects(item, output), ...findingDefects(item, output)];
}

function figureDefects({ expect: { figures } }: ReferenceCase, output: Output): string[] {
  return Object.entries(figures).flatMap(([name, { value, tolerance, observable }]) => {
    const found = output.figures.find(({ id }) => id === figureId(name))?.value;
    if (!observable || (typeof found === 'number' && Math.abs(found - value) <= tolerance)) return [];
    return [`${name} is ${found}, not ${value} ± ${tolerance}`];
  });
}

function findingDefects({ expect: { findings } }: ReferenceCase, output: Output): string[] {
  const given = output.findings.map(({ code }) => code);
  const missing = findings.filter((code) => !given.includes(code)).map((code) => `${code} is missing`);
  const unlisted = output.findings
    .filter(({ code, severity }) => severity !== 'info' && !findings.includes(code))
    .map(({ code }) => `${code} was not expected`);
  return [...missing, ...unlisted];
}
