import { existsSync } from 'node:fs';
import { resolve } from 'node:path';

/**
 * Where a file named on the command line is: npm starts scripts in the folder of the package, but a relative name means the folder in
 * which the person typed it. `besides`: a further folder to look in, that of the file with the jobs.
 */
export function locate(name: string, besides?: string): string {
  const typedIn = process.env.npm_lifecycle_event === 'calculate' ? process.env.INIT_CWD : undefined;
  const folders = [typedIn, process.cwd(), besides].filter((folder) => folder !== undefined);
  const places = folders.map((folder) => resolve(folder, name));
  return places.find((place) => existsSync(place)) ?? (places[0] as string);
}
