/** Sentences of the server's resources for measurement data: uploads, sweeps, sheets, results, setups, limits. */
export const measurements = {
  readersBusy: 'The server is busy with other files. Try this one again in a minute.',
  readingBroke:
    'The server could not finish reading this file. Nothing was stored. Try again, and quote the reference.',
  readingTooLong: (seconds: number) =>
    `Reading this file took longer than ${seconds} seconds, so it was stopped and nothing was stored. Split it into single sweeps.`,
  readingTooMuchMemory:
    'Reading this file needs more memory than one file may take, so it was stopped and nothing was stored. Split it into single sweeps.',
} as const;
