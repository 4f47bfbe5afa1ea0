import type { CSSProperties } from 'react';
import { lineStyle } from '../../../shared/drawing/palette.js';
import { markerOutline } from '../../../shared/drawing/primitives.js';
import { pathData } from '../../../shared/drawing/svg.js';
import './pictures.css';

const WIDTH = 34;
const HEIGHT = 18;
const MARKER_PX = 7;

/** A legend chip: colour, dash and marker of line 1 to 8 on the sheet's ground. The name stands beside it. */
export function LineSample({ number }: { number: number }) {
  const { dash, marker } = lineStyle(number);
  const { outline, isHollow } = markerOutline(marker, MARKER_PX);
  const [x, y] = [WIDTH / 2, HEIGHT / 2];
  const style = { '--sample': `var(--color-s${((number - 1) % 8) + 1})` } as CSSProperties;
  const markerClass = isHollow ? 'chart-sample-hollow' : 'chart-sample-filled';
  return (
    <svg className="chart-sample" width={WIDTH} height={HEIGHT} aria-hidden="true" focusable="false" style={style}>
      <line x1={4} y1={y} x2={WIDTH - 4} y2={y} strokeDasharray={dash.join(' ') || undefined} />
      {outline ? (
        <path className={markerClass} d={pathData(outline, true)} transform={`translate(${x} ${y})`} />
      ) : (
        <circle className={markerClass} cx={x} cy={y} r={MARKER_PX / 2} />
      )}
    </svg>
  );
}
