/** Sentences of the server's resources for measurement data: uploads, sweeps, sheets, results, setups, limits. */
export const measurements = {
  readersBusy: 'The server is busy with other files. Try this one again in a minute.',
  readingBroke:
    'The server could not finish reading this file. Nothing was stored. Try again, and quote the reference.',
  readingTooLong: (seconds: number) =>
    `Reading this file took longer than ${seconds} seconds, so it was stopped and nothing was stored. Split it into single sweeps.`,
  readingTooMuchMemory:
    'Reading this file needs more memory than one file may take, so it was stopped and nothing was stored. Split it into single sweeps.',
  fileTooLarge: (megabytes: number) =>
    `A text file may hold up to ${megabytes} MB. Export fewer points, or split the file into single sweeps.`,
  fileMissing: 'The upload brings no file. Send it as the part named "file".',
  sweepMissing: 'The upload says nothing about the sweep. Send its name and batch as JSON in the part named "sweep".',
  uploadBroken: 'The upload ended early or is not a form with one file. Nothing was stored. Send it again.',
  alreadyHere: (name: string) =>
    `This file is in the project already, as “${name}”. Open that sweep, or read its file again with another rule.`,
  sourceHereAgain:
    'The file of this sweep was added to the project again. Put that sweep away first, then restore this one.',
  itemNotHere: 'This item is not in the project. Choose one of its items, or none.',
  sheetNotHere: 'This sheet is not in the project. Keep the result on one of its sheets, or on none.',
  setupNotHere: 'The team has no such version of a setup for this calculator. Choose one from the list of setups.',
  revisionNotHere:
    'This reading of a sweep is not in the project, or its sweep is in the bin. Run the calculation again.',
  revisionOfOther: 'This reading belongs to another sweep. Run the calculation again.',
  pointsDiffer:
    'The points that were calculated with are not the points of this reading. Load the sweep again and run.',
  calculatorUnknown: (id: string) => `There is no calculator named ${id} here.`,
  calculatorNewer: (version: number) =>
    `The server knows this calculator up to version ${version}. Load the page again and run once more.`,
  setupNameTaken: (name: string) => `The team has a setup named “${name}” already. Choose another name.`,
  limitsNameTaken: (name: string) => `The team has limits named “${name}” already. Choose another name.`,
  tooManyStreams: (most: number) =>
    `You have ${most} pages open on this server that follow changes. Close some, then load this one again.`,
} as const;
