import type { Output } from '../../shared/output.js';
import { defineCalculator } from '../kit/calculator.js';
import { externalsOf } from './derive/externals.js';
import { figureList } from './figure-list.js';
import { curveFindings, isUsable } from './findings/sweep-findings.js';
import { measuredSweeps } from './measured.js';
import { fittedOutput } from './output.js';
import { roles } from './roles.js';
import { settingsSchema } from './settings.js';
import { unfittedOutput } from './unfitted-output.js';

/** Thiele/Small parameters with their uncertainties, from a free-air sweep and whatever else is known of the driver. */
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
  run(inputs, settings, context): Output {
    const measured = measuredSweeps(inputs, settings);
    const findings = curveFindings(measured);
    const [free] = measured;
    if (!free || !isUsable(free)) return unfittedOutput(free, findings);
    const usable = measured.filter(isUsable);
    return fittedOutput({ measured: usable, settings, externals: externalsOf(settings, usable), context }, findings);
  },
});
