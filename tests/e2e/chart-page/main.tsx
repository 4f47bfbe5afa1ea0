import '../../../src/styles.css';
import './page.css';
import { type CSSProperties, StrictMode, useMemo, useState } from 'react';
import { createRoot } from 'react-dom/client';
import { type ChartContent, type ChartState, FITTED_CHART } from '../../../shared/drawing/chart-input.js';
import { LineSample } from '../../../src/components/chart/line-sample.js';
import { MiniCurve } from '../../../src/components/chart/mini-curve.js';
import { MisfitPlot } from '../../../src/components/chart/misfit-plot.js';
import { StillChart } from '../../../src/components/chart/still-chart.js';
import { SweepChart } from '../../../src/components/chart/sweep-chart.js';
import { driverPoints, someSweeps } from './curves.js';

/** The chart alone, told by the address: ?count=2&points=600&theme=dark&tall=1&view=real-imaginary */
const asked = new URLSearchParams(location.search);
const count = Number(asked.get('count') ?? 2);
const points = Number(asked.get('points') ?? 600);
document.documentElement.dataset.theme = asked.get('theme') ?? 'light';
document.documentElement.dataset.density = asked.get('density') ?? 'comfortable';

function contentAsked(): ChartContent {
  const sweeps = someSweeps(count, points);
  const model = driverPoints({ fsHz: 31.9, reOhm: 5.9, resOhm: 39, qms: 5, leHenry: 2.1e-4, points: 300 });
  const isFull = asked.has('full');
  return {
    sweeps: isFull
      ? sweeps.map((s, k) => (k === 0 ? { ...s, isReference: true, masked: maskAround(s.points.frequencyHz) } : s))
      : sweeps,
    title: asked.get('title') ?? 'Rehearsal room 2, mid-woofers',
    revision: 'Revision 3',
    ...(isFull
      ? {
          models: [{ id: 'model', label: 'driver-fit', points: model }],
          markers: [{ frequencyHz: 31.8, label: 'fs' }],
          bands: [
            {
              kind: 'limits' as const,
              quantity: 'magnitude' as const,
              label: 'Limits of lot 7',
              frequencyHz: model.frequencyHz,
              low: model.frequencyHz.map((f) => 5.2 + 0.01 * Math.sqrt(f)),
              high: model.frequencyHz.map((f) => 9 + f / 800),
            },
          ],
        }
      : {}),
  };
}
const maskAround = (hz: Float64Array): Uint8Array => Uint8Array.from(hz, (f) => (f > 47 && f < 53 ? 1 : 0));

function Page() {
  const [state, setState] = useState<ChartState>({ ...FITTED_CHART, ...JSON.parse(asked.get('state') ?? '{}') });
  const [activeSweepId, setActive] = useState('sweep-1');
  const [log, setLog] = useState<string[]>([]);
  const base = useMemo(contentAsked, []);
  const content = useMemo(() => ({ ...base, activeSweepId }), [base, activeSweepId]);
  const say = (words: string) => setLog((old) => [...old, words]);
  return (
    <main style={{ '--chart-height': `${asked.get('height') ?? 620}px` } as CSSProperties}>
      <SweepChart
        className="chart-under-test"
        content={content}
        state={state}
        onStateChange={(next, change) => {
          setState(next);
          say(change);
        }}
        onActiveSweep={setActive}
        onMarker={(hz) => say(`marker ${hz}`)}
        onNote={(hz) => say(`note ${hz}`)}
        onReference={() => say('reference')}
        {...(asked.has('locale') ? { locale: asked.get('locale') ?? 'en' } : {})}
      />
      <pre data-testid="state">{JSON.stringify(state)}</pre>
      <pre data-testid="log">{log.join(',')}</pre>
      {asked.has('tall') && <div style={{ height: 2000 }} />}
    </main>
  );
}
/** ?pieces: the still ones side by side. */
function Pieces() {
  const sweeps = useMemo(() => someSweeps(8, 400), []);
  const misfit = useMemo(() => {
    const x = Array.from(sweeps[0]?.points.frequencyHz ?? []);
    const wave = (phase: number) => x.map((f, i) => 0.004 * Math.sin(Math.log(f) * 9 + phase) * Math.cos(i * 1.7));
    return [
      {
        id: 'misfit',
        label: 'Misfit: W-0417',
        x,
        re: wave(0),
        im: wave(1),
        xUnit: 'Hz',
        yUnit: '1',
        axis: 'residual' as const,
      },
    ];
  }, [sweeps]);
  return (
    <main>
      {sweeps.map((sweep) => (
        <p key={sweep.id}>
          <LineSample number={sweep.lineNumber} /> {sweep.name}
        </p>
      ))}
      <MisfitPlot traces={misfit} locale="en" />
      {sweeps[0] && <MiniCurve points={sweeps[0].points} label="W-0417" />}
      <StillChart content={{ sweeps: sweeps.slice(0, 1), title: 'A driver in free air' }} className="still" />
    </main>
  );
}
createRoot(document.getElementById('root') ?? document.body).render(
  <StrictMode>{asked.has('pieces') ? <Pieces /> : <Page />}</StrictMode>,
);
