import { expect, it, vi } from 'vitest';
import { FITTED_CHART } from '../../../../shared/drawing/chart-input.js';
import { ChartStore } from '../../../../src/components/chart/chart-store.js';

it('tells the page once, when a gesture has settled, and the charts at every move', () => {
  const store = new ChartStore();
  const live = vi.fn();
  store.subscribe(live);
  store.onSettled = vi.fn();
  store.move({ frequencyRangeHz: [20, 2000] });
  store.move({ frequencyRangeHz: [30, 3000] });
  expect(store.onSettled).not.toHaveBeenCalled();
  store.settle({}, 'range');
  expect(live).toHaveBeenCalledTimes(3);
  expect(store.onSettled).toHaveBeenCalledExactlyOnceWith({ ...FITTED_CHART, frequencyRangeHz: [30, 3000] }, 'range');
});

it('does not call a gesture settled that changed nothing', () => {
  const store = new ChartStore({ ...FITTED_CHART, frequencyRangeHz: [20, 200] });
  store.onSettled = vi.fn();
  store.settle({ frequencyRangeHz: [20, 200] }, 'range');
  expect(store.onSettled).not.toHaveBeenCalled();
});

it('drops a move, so that Esc leaves things as they were', () => {
  const store = new ChartStore();
  store.move({ cursorAHz: 50 });
  store.dropMove();
  expect(store.get()).toEqual(FITTED_CHART);
});

it('goes back range by range without touching the cursors', () => {
  const store = new ChartStore();
  store.settle({ frequencyRangeHz: [20, 2000] }, 'range');
  store.settle({ cursorAHz: 100 }, 'cursor');
  store.settle({ frequencyRangeHz: [50, 500] }, 'range');
  store.settleBack(store.takeBack() ?? {});
  expect(store.get()).toMatchObject({ frequencyRangeHz: [20, 2000], cursorAHz: 100 });
  store.settleBack(store.takeBack() ?? {});
  expect(store.get()).toMatchObject({ frequencyRangeHz: null, cursorAHz: 100 });
  expect(store.takeBack()).toBeNull();
});

it('takes what the page says without telling the page', () => {
  const store = new ChartStore();
  store.onSettled = vi.fn();
  store.receive({ ...FITTED_CHART, cursorBHz: 80 });
  expect(store.getSettled().cursorBHz).toBe(80);
  expect(store.onSettled).not.toHaveBeenCalled();
});
