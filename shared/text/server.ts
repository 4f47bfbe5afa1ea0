import type { Role } from '../contracts/team.js';

/** What the server says when it refuses: what happened, and what to do. */
const issues = {
  missing: 'This is needed.',
  wrongType: (expected: string) => `This has to be of the kind ${expected}.`,
  email: 'Write an address like name@example.org.',
  format: 'This is not written the way it has to be.',
  oneOf: (values: string) => `This has to be one of: ${values}.`,
  tooShort: (least: number | bigint) => `Use at least ${least} characters.`,
  tooLong: (most: number | bigint) => `Use at most ${most} characters.`,
  tooFew: (least: number | bigint) => `The list needs at least ${least}.`,
  tooMany: (most: number | bigint) => `The list takes at most ${most}.`,
  atLeast: (least: number | bigint) => `This has to be ${least} or more.`,
  moreThan: (least: number | bigint) => `This has to be more than ${least}.`,
  atMost: (most: number | bigint) => `This has to be ${most} or less.`,
  lessThan: (most: number | bigint) => `This has to be less than ${most}.`,
  unknownFields: (names: string) => `Not known here: ${names}.`,
  other: 'This does not fit here.',
} as const;

export const server = {
  issues,
  notSignedIn: 'Sign in to go on.',
  sessionEnded: 'Your session has ended. Sign in again; what you were doing stays on the page.',
  signInFailed: 'E-mail and password do not match. Check both, or set a new password.',
  passwordNeeded:
    'The account was made in another browser. Write the password chosen there, so that the address goes to the right account.',
  passwordDiffers:
    'This is not the password the account was made with. Write it again, or set a new one by a letter; then nobody else can sign in with the old one.',
  linkNotOpen: 'This link was used already, has ended, or was cut short. Ask for a new one.',
  notVerified:
    'Confirm your e-mail address first: open the link in the letter we sent. Until then you can look, not change.',
  accessDenied: (role: Role) =>
    `Your role here is ${role}, which does not include this. Ask an owner or a lead of the team.`,
  crossSite: 'A change has to come from a page of this server. Open Hummock itself and try again.',
  notFound: 'There is nothing here under this address. It may be in the bin, or belong to another team.',
  noRoute: 'The API has no such address. Check the path and the method.',
  versionMissing: 'Say which version you change: send the header If-Match with the version in double quotes.',
  versionConflict: 'Somebody changed this after you opened it. Both versions are shown; choose what to keep.',
  cursorUnknown: 'The list has no such place. Start again without the cursor.',
  validationFailed: (count: number) =>
    count === 1 ? 'One field needs another look.' : `${count} fields need another look.`,
  bodyUnreadable: 'The request is not readable JSON. Send one JSON value in UTF-8.',
  bodyTooDeep: (levels: number) => `The request holds values nested deeper than ${levels} levels. Send it flatter.`,
  textUnstorable: 'A text holds a character that cannot be stored (code 0). Remove it and send again.',
  tooLarge: (limit: string) => `The request is larger than ${limit}. Send less at once.`,
  tooManyTries: (seconds: number) =>
    seconds < 90
      ? `Too many tries. Wait ${seconds} s, then try again.`
      : `Too many tries. Wait ${Math.ceil(seconds / 60)} min, then try again.`,
  notReady: 'The server is starting, or its database is away. Try again in a moment.',
  internalError:
    'Something went wrong on the server. What you sent was not stored. Try again; if it comes back, send us the reference.',
  demoSignIn: (email: string, password: string) => `Demo sign-in: ${email}, password ${password}`,
  unknownDevice: 'Unknown device',
  device: (browser: string, system: string) => `${browser} on ${system}`,
  firstTeam: (name: string) => `Team of ${name}`,
} as const;
