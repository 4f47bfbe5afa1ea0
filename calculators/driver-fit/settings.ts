import { z } from 'zod';
import type { FieldMeta } from '../kit/calculator.js';

export const COILS = ['inductor', 'inductor+eddy', 'power-law', 'split-power-law', 'semi-inductance'] as const;
export const SUSPENSIONS = ['constant', 'creep', 'relaxing'] as const;
export const MOUNTINGS = ['free-air', 'baffle', 'box'] as const;
export type Mounting = (typeof MOUNTINGS)[number];

const field = (meta: FieldMeta) => ({ ...meta }); // checks the shape of what the form is made from

const group = {
  model: 'Model',
  cone: 'Cone',
  told: 'What you know already',
  air: 'Air',
  way: 'How to fit',
} as const;

const uncertaintyHelp = 'Standard uncertainty (k = 1): about half of the ± you would give it.';

const toldAirSchema = z
  .strictObject({
    temperature: z
      .number()
      .min(200)
      .max(400)
      .optional()
      .meta(field({ label: 'Temperature', unit: 'K', help: '293.15 K (20 °C) if left empty.' })),
    pressure: z
      .number()
      .min(20_000)
      .max(150_000)
      .optional()
      .meta(
        field({
          label: 'Pressure',
          unit: 'Pa',
          help: 'At your place, not reduced to sea level. 101325 Pa if left empty.',
        }),
      ),
    humidity: z
      .number()
      .min(0)
      .max(1)
      .optional()
      .meta(field({ label: 'Relative humidity', unit: '1', help: '0.5 means 50 %.' })),
  })
  .meta(field({ label: 'Temperature, pressure, humidity', help: 'From a room thermometer and a barometer.' }));
const givenAirSchema = z
  .strictObject({
    density: z
      .number()
      .min(0.1)
      .max(10)
      .meta(field({ label: 'Density', unit: 'kg/m³', help: 'Taken as exact.' })),
    speedOfSound: z
      .number()
      .min(100)
      .max(1000)
      .meta(field({ label: 'Speed of sound', unit: 'm/s', help: 'Taken as exact.' })),
  })
  .meta(field({ label: 'Density and speed of sound', help: 'Given outright.' }));

const givenSchema = z
  .strictObject({
    Mms: z
      .number()
      .positive()
      .max(10)
      .optional()
      .meta(field({ label: 'Moving mass Mms', unit: 'kg', help: 'With its air load, as mounted.' })),
    Bl: z
      .number()
      .positive()
      .max(1000)
      .optional()
      .meta(field({ label: 'Force factor Bl', unit: 'T·m', help: 'From a maker or from a force test.' })),
    Cms: z
      .number()
      .positive()
      .max(1)
      .optional()
      .meta(field({ label: 'Compliance Cms', unit: 'm/N', help: 'Of the suspension at resonance.' })),
    uncertainty: z
      .number()
      .positive()
      .optional()
      .meta(
        field({ label: 'Its uncertainty', help: `${uncertaintyHelp} In the same unit; taken as exact if left empty.` }),
      ),
  })
  .refine(({ Mms, Bl, Cms }) => [Mms, Bl, Cms].filter((value) => value !== undefined).length === 1, {
    error: 'give exactly one of Mms, Bl and Cms',
  });

const bandSchema = z
  .tuple([z.number().positive(), z.number().positive()])
  .refine(([low, high]) => low < high, { error: 'the low end has to lie below the high end' });

/** Settings of version 1, SI throughout. */
export const settingsSchema = z
  .strictObject({
    coil: z
      .enum(['auto', ...COILS])
      .default('auto')
      .meta(
        field({
          label: 'Voice coil',
          group: group.model,
          help: 'How the coil’s own impedance rises. Auto tries all and keeps what the data support.',
        }),
      ),
    suspension: z
      .enum(['auto', ...SUSPENSIONS])
      .default('auto')
      .meta(
        field({
          label: 'Suspension',
          group: group.model,
          help: 'Constant stiffness, logarithmic creep, or one relaxation time.',
        }),
      ),
    pistonDiameter: z
      .number()
      .min(0.001)
      .max(2)
      .optional()
      .meta(
        field({
          label: 'Piston diameter',
          unit: 'm',
          group: group.cone,
          help: 'From the middle of the surround on one side to the middle on the other.',
        }),
      ),
    pistonDiameterUncertainty: z
      .number()
      .nonnegative()
      .max(1)
      .optional()
      .meta(field({ label: 'Piston diameter uncertainty', unit: 'm', group: group.cone, help: uncertaintyHelp })),
    pistonArea: z
      .number()
      .min(1e-6)
      .max(4)
      .optional()
      .meta(field({ label: 'Piston area', unit: 'm²', group: group.cone, help: 'Instead of the diameter.' })),
    pistonAreaUncertainty: z
      .number()
      .nonnegative()
      .max(1)
      .optional()
      .meta(field({ label: 'Piston area uncertainty', unit: 'm²', group: group.cone, help: uncertaintyHelp })),
    mounting: z
      .enum(MOUNTINGS)
      .default('free-air')
      .meta(
        field({
          label: 'Mounting',
          group: group.cone,
          help: 'How the driver was held: decides the air load that Mmd leaves out.',
        }),
      ),
    massUncertainty: z
      .number()
      .nonnegative()
      .max(1)
      .optional()
      .meta(
        field({
          label: 'Added mass uncertainty',
          unit: 'kg',
          group: group.told,
          help: `${uncertaintyHelp} For each added mass.`,
        }),
      ),
    volumeUncertainty: z
      .number()
      .nonnegative()
      .max(10)
      .optional()
      .meta(field({ label: 'Test volume uncertainty', unit: 'm³', group: group.told, help: uncertaintyHelp })),
    boxMass: z
      .enum(['auto', 'equal', 'unequal'])
      .default('auto')
      .meta(
        field({
          label: 'Moving mass in the test box',
          group: group.told,
          help: 'Equal to that in free air, or free to differ by its air load. Auto keeps it equal until the sweeps say otherwise.',
        }),
      ),
    dcResistance: z
      .number()
      .positive()
      .max(10_000)
      .optional()
      .meta(field({ label: 'DC resistance', unit: 'Ω', group: group.told, help: 'Measured apart, leads taken off.' })),
    dcResistanceUncertainty: z
      .number()
      .nonnegative()
      .max(1000)
      .optional()
      .meta(field({ label: 'DC resistance uncertainty', unit: 'Ω', group: group.told, help: uncertaintyHelp })),
    given: givenSchema.optional().meta(
      field({
        label: 'Given figure',
        group: group.told,
        help: 'One figure known already stands in for an added mass or a test box.',
      }),
    ),
    air: z
      .union([toldAirSchema, givenAirSchema])
      .optional()
      .meta(
        field({
          label: 'Air',
          group: group.air,
          help: 'Vas follows the air pressure. 20 °C at sea level if left empty.',
        }),
      ),
    band: bandSchema.optional().meta(
      field({
        label: 'Band',
        unit: 'Hz',
        group: group.way,
        help: 'Only points inside this band are used. All of them if left empty.',
      }),
    ),
    robust: z
      .boolean()
      .default(true)
      .meta(
        field({
          label: 'Leave wild points out',
          group: group.way,
          help: 'Points far off the curve and mains hum are recognised and not fitted.',
        }),
      ),
    bootstrap: z
      .int()
      .min(0)
      .max(2000)
      .default(0)
      .meta(
        field({
          label: 'Resampled refits',
          group: group.way,
          help: 'Number of refits with resampled misfit for the intervals. 0: from the fit’s covariance.',
        }),
      ),
  })
  .refine((s) => s.pistonDiameter === undefined || s.pistonArea === undefined, {
    path: ['pistonArea'],
    error: 'give the piston’s diameter or its area, not both',
  });
export type DriverFitSettings = z.output<typeof settingsSchema>;
