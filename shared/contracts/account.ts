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
/** The same for a new and for a known address: go and look at the mail. */
export const LetterSentSchema = z.object({ email: z.string() });
export const SignInSchema = z.strictObject({ email: EmailSchema, password: z.string().min(1).max(200) });
export type SignIn = z.infer<typeof SignInSchema>;
/** The password only where the answer asks for it (password-needed): the link was opened in another browser. */
export const VerifySchema = z.strictObject({
  code: z.string().min(20).max(100),
  password: z.string().min(1).max(200).optional(),
});
export const ForgotSchema = z.strictObject({ email: EmailSchema });
export const ResetSchema = z.strictObject({ code: z.string().min(20).max(100), password: PasswordSchema });

const preferenceShape = {
  theme: z.enum(['system', 'light', 'dark']),
  units: z.enum(['metric', 'inch']),
  density: z.enum(['comfortable', 'compact', 'workshop']),
  symbolsFirst: z.boolean(),
  letterKeys: z.boolean(), // single-letter keys on the chart and lists
  locale: z.string().max(35).nullable(), // BCP 47; null follows the browser
  paneSizes: z.record(z.string().max(60), z.number().min(0).max(100)), // per cent, by pane
};
export const PreferencesSchema = z.strictObject({
  theme: preferenceShape.theme.default('system'),
  units: preferenceShape.units.default('metric'),
  density: preferenceShape.density.default('comfortable'),
  symbolsFirst: preferenceShape.symbolsFirst.default(false),
  letterKeys: preferenceShape.letterKeys.default(true),
  locale: preferenceShape.locale.default(null),
  paneSizes: preferenceShape.paneSizes.default({}),
});
/** Only what changes: a field with a default would come back as its default where it was left out. */
export const ChangedPreferencesSchema = z.strictObject(preferenceShape).partial();
export type Preferences = z.infer<typeof PreferencesSchema>;

export const MeSchema = z.object({
  ...rowShape,
  email: z.string(),
  name: z.string(),
  verified: z.boolean(),
  preferences: PreferencesSchema,
  teams: z.array(TeamSchema),
  demoProjectId: z.uuid().nullable(), // the invented project, if this installation has one: open to look at for all
});
export type Me = z.infer<typeof MeSchema>;
export const UpdateMeSchema = z.strictObject({
  name: z.string().trim().min(1).max(80).optional(),
  preferences: ChangedPreferencesSchema.optional(),
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
export const SessionListSchema = z.object({ items: z.array(SessionSchema) });
