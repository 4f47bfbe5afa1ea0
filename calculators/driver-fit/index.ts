import type { Figure, Finding, Output } from '../../shared/output.js';
import { defineCalculator } from '../kit/calculator.js';
import { magnitudeOf } from '../kit/sweep.js';
import { figureList } from './figure-list.js';
import { curveKind } from './resonances.js';
import { roles } from './roles.js';
import { settingsSchema } from './settings.js';
import { type ThreePoint, threePoint } from './three-point.js';
import { threePointMarkers, threePointTable } from './three-point-table.js';

/** Thiele/Small parameters with their uncertainties from a free-air sweep and what else is known. */
export const driverFit = defineCalculator({
  id: 'driver-fit',
  version: 1,
  title: 'Thiele/Small parameters',
  summary:
    'What a driver really is: its resonance, damping, coil, moving mass and equivalent volume, each with how sure that is.',
  quick: true,
  roles,
  settings: settingsSchema,
  settingsVersion: 1,
  migrate: {},
  figures: figureList,
  run(inputs, settings): Output {
    const sweep = inputs['free-air']?.[0]?.sweep;
    if (!sweep) throw new Error('driver-fit ran without a free-air sweep');
    const magnitude = magnitudeOf(sweep);
    const kind = curveKind(sweep.frequencyHz, magnitude, sweep.imaginaryOhm);
    const findings: Finding[] = [];
    let result: ThreePoint | null = null;
    if (kind.kind === 'driver') {
      const re = settings.dcResistance ?? Math.min(...magnitude);
      result = threePoint(sweep.frequencyHz, magnitude, re, kind.main.index);
    }
    const figure = (id: string, unit: string, value: number | undefined): Figure =>
      value === undefined ? { id, unit, value: null, note: 'No resonance inside the sweep.' } : { id, unit, value };
    return {
      figures: [
        figure('Re', 'Ω', result?.reOhm),
        figure('fs', 'Hz', result?.fsHz),
        figure('Qms', '1', result?.qms),
        figure('Qes', '1', result?.qes),
        figure('Qts', '1', result?.qts),
        figure('Zmax', 'Ω', result?.zMaxOhm),
      ],
      traces: [],
      markers: threePointMarkers(result),
      findings,
      tables: [threePointTable([{ sweep: sweep.name, role: roles['free-air'].label, result }])],
    };
  },
});
