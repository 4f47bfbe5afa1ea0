/** Letters: a plain-text part, one action, and why you got it. */
const foot = 'Hummock, the workbench for impedance sweeps of loudspeakers and their parts.';

export const mail = {
  foot,
  verify: {
    subject: 'Confirm your address for Hummock',
    lead: (name: string) => `Hello ${name},`,
    body: 'open this link to confirm that this address is yours. It works once, for two days.',
    why: 'You get this letter because somebody, most likely you, made an account with this address. If it was not you, leave it: without the link nothing can be added to the account.',
  },
  knownAddress: {
    subject: 'You already have an account at Hummock',
    lead: (name: string) => `Hello ${name},`,
    body: 'somebody, most likely you, tried to make a second account with this address. Sign in with the one you have, or set a new password there.',
    why: 'You get this letter because the form to make an account was sent with this address. Nothing was changed.',
  },
  reset: {
    subject: 'Set a new password for Hummock',
    lead: (name: string) => `Hello ${name},`,
    body: 'open this link to set a new password. It works once, for one hour, and signs you out on every device.',
    why: 'You get this letter because somebody, most likely you, asked for a new password. If it was not you, leave it: your password stays as it is.',
  },
} as const;
