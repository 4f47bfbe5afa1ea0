import type { Marker, Table } from '../../../shared/output.js';
import type { ThreePoint } from './three-point.js';

export interface NamedThreePoint {
  readonly sweep: string;
  readonly role: string;
  readonly result: ThreePoint | null;
}

/** What the definition method reads off each sweep, with every step of it, so that a person can check it by hand. */
export function threePointTable(rows: readonly NamedThreePoint[]): Table {
  return {
    id: 'three-point',
    title: 'By the three-point method',
    columns: [
      { id: 'sweep', label: 'Sweep', kind: 'text' },
      { id: 'role', label: 'Added as', kind: 'text' },
      { id: 'method', label: 'Method', kind: 'text' },
      { id: 'Re', label: 'Re', kind: 'number', unit: 'Ω' },
      { id: 'Zmax', label: 'Zmax', kind: 'number', unit: 'Ω' },
      { id: 'r0', label: 'r0 = Zmax/Re', kind: 'number' },
      { id: 'level', label: '|Z| at f1 and f2', kind: 'number', unit: 'Ω' },
      { id: 'fs', label: 'fs', kind: 'number', unit: 'Hz' },
      { id: 'f1', label: 'f1', kind: 'number', unit: 'Hz' },
      { id: 'f2', label: 'f2', kind: 'number', unit: 'Hz' },
      { id: 'flanks', label: '√(f1·f2)', kind: 'number', unit: 'Hz' },
      { id: 'flanksOverFs', label: '√(f1·f2)/fs', kind: 'number' },
      { id: 'Qms', label: 'Qms', kind: 'number' },
      { id: 'Qes', label: 'Qes', kind: 'number' },
      { id: 'Qts', label: 'Qts', kind: 'number' },
    ],
    rows: rows.map(({ sweep, role, result }) => ({
      sweep,
      role,
      method: 'three-point',
      Re: result?.reOhm ?? null,
      Zmax: result?.zMaxOhm ?? null,
      r0: result?.r0 ?? null,
      level: result ? result.reOhm * Math.sqrt(result.r0) : null,
      fs: result?.fsHz ?? null,
      f1: result?.f1Hz ?? null,
      f2: result?.f2Hz ?? null,
      flanks: result?.flanksHz ?? null,
      flanksOverFs: result ? result.flanksHz / result.fsHz : null,
      Qms: result?.qms ?? null,
      Qes: result?.qes ?? null,
      Qts: result?.qts ?? null,
    })),
  };
}

export function threePointMarkers(result: ThreePoint | null): Marker[] {
  if (!result) return [];
  return [
    { frequency: result.f1Hz, label: 'f1' },
    { frequency: result.fsHz, label: 'fs' },
    { frequency: result.f2Hz, label: 'f2' },
  ];
}
