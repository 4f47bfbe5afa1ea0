import { useMemo } from 'react';
import { columnsOf, extentOf, type ImpedancePoints } from '../../../shared/drawing/curves/columns.js';
import { decimatedPath } from '../../../shared/drawing/curves/decimate.js';
import { axisScale } from '../../../shared/drawing/scales/axis-scale.js';
import { pathData } from '../../../shared/drawing/svg.js';
import './pictures.css';

const WIDTH = 240;
const HEIGHT = 72;
const EDGE = 4;

interface MiniCurveProps {
  readonly points: ImpedancePoints;
  readonly label: string; // what a screen reader says instead
  readonly lineNumber?: number; // colour 1 to 8
  readonly className?: string;
}

/** The shape of |Z| over a baseline, both axes logarithmic: a still sketch for cards. */
export function MiniCurve({ points, label, lineNumber = 1, className = '' }: MiniCurveProps) {
  const data = useMemo(() => sketch(points), [points]);
  return (
    <svg
      className={`chart-mini ${className}`}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      preserveAspectRatio="none"
      role="img"
      aria-label={label}
    >
      <line className="chart-mini-base" x1={0} y1={HEIGHT - 1} x2={WIDTH} y2={HEIGHT - 1} />
      <path d={data} stroke={`var(--color-s${((lineNumber - 1) % 8) + 1})`} />
    </svg>
  );
}

function sketch(points: ImpedancePoints): string {
  const { frequencyHz, lnFrequency, magnitudeOhm, lnMagnitude } = columnsOf(points);
  const [across, up] = [extentOf(frequencyHz), extentOf(magnitudeOhm)];
  if (!across || !up || across[0] === across[1] || up[0] <= 0) return '';
  const x = axisScale('log', across, 0, WIDTH);
  const y = axisScale('log', up[0] === up[1] ? [up[0] / 2, up[1] * 2] : up, HEIGHT - EDGE * 2, EDGE);
  return pathData(decimatedPath(lnFrequency, lnMagnitude, x, y), false);
}
