import { account } from './text/account.js';
import { chart } from './text/chart.js';
import { common } from './text/common.js';
import { errors } from './text/errors.js';
import { mail } from './text/mail.js';
import { measurements } from './text/measurements.js';
import { project } from './text/project.js';
import { readingText } from './text/reading.js';
import { server } from './text/server.js';
import { sheet } from './text/sheet.js';
import { unpack } from './text/unpack.js';

/** Every word the product shows, one file an area. Sentences with gaps are functions of what fills them. */
export const text = {
  account,
  chart,
  common,
  errors,
  mail,
  measurements,
  project,
  reading: readingText,
  server,
  sheet,
  unpack,
} as const;
