import { useCallback, useEffect, useRef, useState } from 'react';
import { text } from '../../../shared/text.js';

const SHOWN_MS = 2000;
const isMac = (): boolean => /mac|iphone|ipad/i.test(navigator.userAgent);

/** "Hold Ctrl or click the chart to zoom", for two seconds after a wheel that scrolled the page instead. */
export function useZoomHint() {
  const [isShown, setIsShown] = useState(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useEffect(() => () => clearTimeout(timer.current), []);
  const show = useCallback(() => {
    setIsShown(true);
    clearTimeout(timer.current);
    timer.current = setTimeout(() => setIsShown(false), SHOWN_MS);
  }, []);
  return { isShown, show, words: text.chart.zoomHint(isMac()) };
}
