import { useCallback, useEffect, useRef } from 'react';
import { useLocation, useNavigate, useNavigationType } from 'react-router-dom';
import type { ChartState } from '../../../shared/drawing/chart-input.js';

type Ranges = Pick<
  ChartState,
  'frequencyRangeHz' | 'magnitudeRangeOhm' | 'phaseRangeDeg' | 'realRangeOhm' | 'imaginaryRangeOhm'
>;
const rangesOf = ({
  frequencyRangeHz,
  magnitudeRangeOhm,
  phaseRangeDeg,
  realRangeOhm,
  imaginaryRangeOhm,
}: Ranges): Ranges => ({ frequencyRangeHz, magnitudeRangeOhm, phaseRangeDeg, realRangeOhm, imaginaryRangeOhm });

/** Ranges are in the browser's history: Back goes to the range before, at last to the one that was shown on arrival. Answers what puts a new one there. */
export function useRangeHistory(shown: Ranges, onBack: (ranges: Ranges) => void): (state: ChartState) => void {
  const navigate = useNavigate();
  const location = useLocation();
  const type = useNavigationType();
  const isFirst = useRef(true);
  const arrival = useRef(shown);
  const latest = useRef(onBack);
  latest.current = onBack;
  useEffect(() => {
    const isArrival = isFirst.current;
    isFirst.current = false;
    if (type !== 'POP' || isArrival) return;
    const { ranges } = (location.state ?? {}) as { ranges?: Ranges };
    latest.current(ranges ?? rangesOf(arrival.current));
  }, [location, type]);
  return useCallback(
    (state: ChartState) => void navigate('.', { state: { ranges: rangesOf(state) }, preventScrollReset: true }),
    [navigate],
  );
}
