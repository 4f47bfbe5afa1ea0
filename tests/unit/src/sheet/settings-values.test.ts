import { expect, it } from 'vitest';
import { settingAt, withSetting } from '../../../../src/features/sheet/settings-values.js';

it('sets and reads a nested setting without touching its neighbours', () => {
  const values = withSetting({ coil: 'inductor', air: { temperature: 295 } }, ['air', 'pressure'], 98000);
  expect(values).toEqual({ coil: 'inductor', air: { temperature: 295, pressure: 98000 } });
  expect(settingAt(values, ['air', 'pressure'])).toBe(98000);
  expect(settingAt(values, ['given', 'Mms'])).toBeUndefined();
});

it('takes an emptied setting out, and with it a group that has nothing left, so that defaults apply again', () => {
  expect(withSetting({ coil: 'inductor', air: { temperature: 295 } }, ['air', 'temperature'], undefined)).toEqual({
    coil: 'inductor',
  });
});
