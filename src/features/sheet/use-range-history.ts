import { useCallback, useEffect, useRef } from 'react';
import { useLocation, useNavigate, useNavigationType } from 'react-router-dom';
import type { ChartState } from '../../../shared/drawing/chart-input.js';

type Ranges = Pick<
  ChartState,
  'frequencyRangeHz' | 'magnitudeRangeOhm' | 'phaseRangeDeg' | 'realRangeOhm' | 'imaginaryRangeOhm'
>;
const EVERYTHING: Ranges = {
  frequencyRangeHz: null,
  magnitudeRangeOhm: null,
  phaseRangeDeg: null,
  realRangeOhm: null,
  imaginaryRangeOhm: null,
};

/** Ranges are in the browser's history: Back goes to the range before. Answers what puts a new one there. */
export function useRangeHistory(onBack: (ranges: Ranges) => void): (state: ChartState) => void {
  const navigate = useNavigate();
  const location = useLocation();
  const type = useNavigationType();
  const isFirst = useRef(true);
  const latest = useRef(onBack);
  latest.current = onBack;
  useEffect(() => {
    const isArrival = isFirst.current;
    isFirst.current = false;
    if (type !== 'POP' || isArrival) return;
    const { ranges } = (location.state ?? {}) as { ranges?: Ranges };
    latest.current(ranges ?? EVERYTHING);
  }, [location, type]);
  return useCallback(
    ({ frequencyRangeHz, magnitudeRangeOhm, phaseRangeDeg, realRangeOhm, imaginaryRangeOhm }: ChartState) => {
      const ranges = { frequencyRangeHz, magnitudeRangeOhm, phaseRangeDeg, realRangeOhm, imaginaryRangeOhm };
      void navigate('.', { state: { ranges }, preventScrollReset: true });
    },
    [navigate],
  );
}
