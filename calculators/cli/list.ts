import { z } from 'zod';
import { calculators } from '../index.js';
import type { CalculatorDefinition } from '../kit/calculator.js';
import { READ_VERSION } from './read-job.js';

/** Every calculator with its roles, settings (JSON Schema) and figures. */
export function list() {
  return [readEntry, ...calculators.map(entry)];
}

const readEntry = {
  id: 'read',
  version: READ_VERSION,
  title: 'Read a sweep',
  summary:
    'Recognises a text table of impedance and gives its points, how it was read, and what to know before using it.',
  roles: { sweep: { label: 'Sweep', least: 1, most: 1, needs: 'sweep', keys: {} } },
  settings: {
    type: 'object',
    properties: {
      frequencies: {
        type: 'array',
        items: { type: 'number' },
        description: 'Hz: resample to these, ln Z by piecewise cubics in ln f; ascending, inside the sweep.',
      },
      reading: {
        type: 'object',
        description: 'Corrections: separator, decimalMark, columns, frequencyUnit and so on.',
      },
    },
  },
  figures: [],
};

function entry({ id, version, title, summary, roles, settings, figures }: CalculatorDefinition) {
  const schema = z.toJSONSchema(settings, { unrepresentable: 'any', io: 'input' });
  return { id, version, title, summary, roles, settings: schema, figures };
}
