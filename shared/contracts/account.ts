import { z } from 'zod';
import { rowShape } from './paging.js';
import { TeamSchema } from './team.js';

export const EmailSchema = z.string().trim().toLowerCase().max(254).pipe(z.email());
export const PasswordSchema = z.string().min(10).max(200);

export const RegisterSchema = z.strictObject({
  email: EmailSchema,
  password: PasswordSchema,
  name: z.string().trim().min(1).max(80),
  teamName: z.string().trim().min(1).max(80).optional(), // the person's first team; named after them if left out
});
export type Register = z.infer<typeof RegisterSchema>;
export const SignInSchema = z.strictObject({ email: EmailSchema, password: z.string().min(1).max(200) });
export type SignIn = z.infer<typeof SignInSchema>;
export const VerifySchema = z.strictObject({ code: z.string().min(20).max(100) });
export const ForgotSchema = z.strictObject({ email: EmailSchema });
export const ResetSchema = z.strictObject({ code: z.string().min(20).max(100), password: PasswordSchema });

export const PreferencesSchema = z.strictObject({
  theme: z.enum(['system', 'light', 'dark']).default('system'),
  units: z.enum(['metric', 'inch']).default('metric'),
  density: z.enum(['comfortable', 'compact', 'workshop']).default('comfortable'),
  symbolsFirst: z.boolean().default(false),
  letterKeys: z.boolean().default(true), // single-letter keys on the chart and lists
  locale: z.string().max(35).nullable().default(null), // BCP 47; null follows the browser
  paneSizes: z.record(z.string().max(60), z.number().min(0).max(100)).default({}), // per cent, by pane
});
export type Preferences = z.infer<typeof PreferencesSchema>;

export const MeSchema = z.object({
  ...rowShape,
  email: z.string(),
  name: z.string(),
  verified: z.boolean(),
  preferences: PreferencesSchema,
  teams: z.array(TeamSchema),
});
export type Me = z.infer<typeof MeSchema>;
export const UpdateMeSchema = z.strictObject({
  name: z.string().trim().min(1).max(80).optional(),
  preferences: PreferencesSchema.partial().optional(),
});
export type UpdateMe = z.infer<typeof UpdateMeSchema>;

export const SessionSchema = z.object({
  id: z.uuid(),
  device: z.string(), // from the user agent, in words
  createdAt: z.iso.datetime(),
  lastUsedAt: z.iso.datetime(),
  isThisOne: z.boolean(),
});
export type Session = z.infer<typeof SessionSchema>;
