const MEGABYTE = 1024 * 1024;
const inMegabytes = (bytes: number) => `${Math.round(bytes / MEGABYTE)}\u00A0MB`;

export const unpack = {
  tooLarge: (bytes: number, most: number) =>
    `The file holds ${inMegabytes(bytes)}; text files are read up to ${inMegabytes(most)}. Export it with fewer points.`,
  alreadyHereAs: (name: string) => `This file is here already, as “${name}”.`,
} as const;
