import { describe, expect, it } from 'vitest';
import { assign, jsonOrText, parseArguments, UsageError } from '../../../calculators/cli/arguments.js';
import { conditionsOf, overridesOf, splitKeys } from '../../../calculators/cli/inputs.js';

describe('parseArguments', () => {
  it('parts command, files and options, each option with or without an equals sign', () => {
    const words = [
      'driver-fit',
      '--in',
      'free-air=a.csv',
      '--in=added-mass=b.csv?mass=0.01',
      '--set',
      'coil=auto',
      '--traces',
    ];
    expect(parseArguments([...words, '--settings=s.json'])).toEqual({
      command: 'driver-fit',
      rest: [],
      inputs: [
        { name: 'free-air', text: 'a.csv' },
        { name: 'added-mass', text: 'b.csv?mass=0.01' },
      ],
      set: [{ name: 'coil', text: 'auto' }],
      settingsFile: 's.json',
      reading: undefined,
      traces: true,
    });
  });
  it.each([
    [[]],
    [['--in']],
    [['read', '--nonsense', 'x']],
    [['read', '--in']],
    [['read', '--set', 'x']],
    [['x', '--in', '=f']],
  ])('calls %j wrong usage', (words) => expect(() => parseArguments(words)).toThrow(UsageError));
});

describe('splitKeys', () => {
  it.each([
    ['a.csv', 'a.csv', {}],
    ['a.csv?mass=0.012', 'a.csv', { mass: 0.012 }],
    [
      'a.csv?mass=1e-2&massUncertainty=0.0001&operator=Ada',
      'a.csv',
      { mass: 0.01, massUncertainty: 0.0001, operator: 'Ada' },
    ],
    ['what?.csv', 'what?.csv', {}],
    ['what?.csv?mass=1', 'what?.csv', { mass: 1 }],
    ['a.csv?reading={"separator":"tab"}', 'a.csv', { reading: { separator: 'tab' } }],
  ])('parts %s', (text, file, keys) => expect(splitKeys(text)).toEqual({ file, keys }));
});

describe('assign', () => {
  it('nests dotted names and reads JSON where it parses', () => {
    const settings: Record<string, unknown> = { air: { humidity: 0.5 } };
    for (const text of ['air.temperature=293', 'coil=power-law', 'robust=true', 'band=[20,2000]', 'given.Mms=0.01']) {
      const [name = '', value = ''] = text.split('=');
      assign(settings, { name, text: value });
    }
    expect(settings).toEqual({
      air: { humidity: 0.5, temperature: 293 },
      coil: 'power-law',
      robust: true,
      band: [20, 2000],
      given: { Mms: 0.01 },
    });
  });
  it.each(['__proto__.x', 'a..b', '.a'])('refuses the name %s', (name) => {
    expect(() => assign({}, { name, text: '1' })).toThrow(UsageError);
    expect(Object.hasOwn(Object.prototype, 'x')).toBe(false);
  });
  it('takes text that is no JSON as it is', () => expect(jsonOrText('{oops')).toBe('{oops'));
});

describe('what is told with a file', () => {
  it('becomes the conditions of the sweep, where it can be', () => {
    expect(conditionsOf('added-mass', { mass: 0.01 })).toEqual({ role: 'added-mass', addedMassKg: 0.01 });
    expect(conditionsOf('known-volume', { volume: 0.02 })).toEqual({ role: 'known-volume', testVolumeM3: 0.02 });
    expect(conditionsOf('box', { radiatorMass: 0 })).toEqual({ role: 'box', radiatorMassKg: 0 });
    expect(conditionsOf('driver', { mass: -1 })).toEqual({ role: 'free-air' });
  });
  it('is checked as a reading, by the name of the part', () => {
    expect(overridesOf({ separator: 'tab' })).toEqual({ separator: 'tab' });
    const where = (reading: unknown) => {
      try {
        return overridesOf(reading);
      } catch (error) {
        return String(Object(error).where);
      }
    };
    expect(where({ separator: 'pipe' })).toBe('reading.separator');
    expect(where({ colour: 1 })).toBe('reading.colour');
    expect(where('tab')).toBe('reading');
  });
});
