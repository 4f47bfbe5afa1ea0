import { expect, it } from 'vitest';
import { storable } from '../../../server/reading/storable.js';

it('leaves out the character of code 0 and replaces half pairs, at every depth', () => {
  const reading = { comments: ['a\u0000b', 'half \ud800 pair'], guesses: { reason: '\udc00' }, rows: 3, none: null };
  expect(storable(reading)).toEqual({
    comments: ['ab', 'half \ufffd pair'],
    guesses: { reason: '\ufffd' },
    rows: 3,
    none: null,
  });
});

it('leaves whole pairs and everything else as it is', () => {
  const text = 'Ω µ 𝄞 ‰';
  expect(storable([text])).toEqual([text]);
});
