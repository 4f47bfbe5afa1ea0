import { z } from 'zod';

/**
 * The one shape of every calculator's answer, built-in or scripted, so that one screen, one table,
 * one export and one report can show them all. SI units everywhere; the screen converts.
 * JSON-safe: curves are plain number arrays here and may be typed arrays while they are computed.
 */

export const SEVERITIES = ['info', 'caution', 'fault'] as const;
export const SeveritySchema = z.enum(SEVERITIES);
export type Severity = z.infer<typeof SeveritySchema>;

const finite = z.number();

/** An uneven or one-sided interval; an end that cannot be known is null. */
export const IntervalSchema = z.strictObject({
  low: finite.nullable(),
  high: finite.nullable(),
  coverage: z.number().gt(0).lt(1), // probability, 0.95 = 95 %
  kind: z.enum(['fit', 'profile', 'bootstrap', 'repeats', 'definition']),
});

export const FigureSchema = z.strictObject({
  id: z.string().min(1), // the trade's symbol as the calculator declares it: fs, Qts, Vas
  value: z.union([finite, z.string(), z.null()]), // null with a note where it cannot be known from what was given
  unit: z.string(), // SI, '1' for a pure number, '' for a text
  uncertainty: finite.nonnegative().optional(), // standard uncertainty, k = 1, same unit
  dof: z.number().positive().optional(), // degrees of freedom of the uncertainty
  interval: IntervalSchema.optional(),
  note: z.string().optional(), // why there is no value or no uncertainty, and what to do
});
export type Figure = z.infer<typeof FigureSchema>;

export const FIT_STATUSES = ['converged', 'at-bound', 'stalled', 'iteration-limit'] as const;
export const FitStatusSchema = z.enum(FIT_STATUSES);
export type FitStatus = z.infer<typeof FitStatusSchema>;

export const FitSchema = z.strictObject({
  status: FitStatusSchema,
  model: z.string(),
  dof: z.number(), // real residuals minus parameters
  residual: z.number(), // weighted rms, relative
  parameters: z.array(z.string()),
  correlations: z.array(z.array(z.number())), // (p, p), in the order of parameters
  atBound: z.array(z.string()), // parameters that ended on a bound or never moved
});
export type Fit = z.infer<typeof FitSchema>;

const Curve = z.custom<ArrayLike<number>>(
  (value) => Array.isArray(value) || value instanceof Float64Array,
  'a list of numbers',
);

export const TraceSchema = z.strictObject({
  id: z.string().min(1),
  label: z.string(),
  x: Curve,
  y: Curve.optional(), // either y …
  re: Curve.optional(), // … or re and im
  im: Curve.optional(),
  xUnit: z.string(),
  yUnit: z.string(),
  axis: z.enum(['impedance', 'residual', 'response', 'resistance', 'other']),
});
export type Trace = z.infer<typeof TraceSchema>;

export const MarkerSchema = z.strictObject({ frequency: z.number().positive(), label: z.string() });
export type Marker = z.infer<typeof MarkerSchema>;

export const FindingSchema = z.strictObject({
  code: z.string().regex(/^[a-z0-9-]+$/),
  severity: SeveritySchema,
  message: z.string().min(1), // what a person should know, and what to do next
  frequency: z.number().optional(), // Hz
  band: z.tuple([z.number(), z.number()]).optional(), // Hz
  evidence: z.record(z.string(), z.union([z.number(), z.string(), z.boolean(), z.null()])).optional(),
});
export type Finding = z.infer<typeof FindingSchema>;

export const TableColumnSchema = z.strictObject({
  id: z.string().min(1),
  label: z.string(),
  kind: z.enum(['text', 'number', 'boolean']),
  unit: z.string().optional(),
});
export const TableSchema = z.strictObject({
  id: z.string().min(1),
  title: z.string(),
  columns: z.array(TableColumnSchema),
  rows: z.array(z.record(z.string(), z.union([z.string(), z.number(), z.boolean(), z.null()]))),
});
export type Table = z.infer<typeof TableSchema>;

export const OutputSchema = z.strictObject({
  summary: z.string().optional(), // one sentence on top: what to trust and how far, what to repeat
  figures: z.array(FigureSchema),
  fit: FitSchema.optional(),
  traces: z.array(TraceSchema),
  markers: z.array(MarkerSchema),
  findings: z.array(FindingSchema),
  tables: z.array(TableSchema),
});
export type Output = z.infer<typeof OutputSchema>;

export const EMPTY_OUTPUT: Output = { figures: [], traces: [], markers: [], findings: [], tables: [] };
