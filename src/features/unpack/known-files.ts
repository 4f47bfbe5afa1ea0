import type { ProjectStore } from '../../lib/project-store/project-store.js';

const GATHER_MS = 100;
const MOST_AT_ONCE = 500;

interface Asked {
  readonly sha256: string;
  readonly answer: (name: string | undefined) => void;
}

/** Asks the project which files it holds already; questions that come close together go as one. */
export class KnownFiles {
  private asked: Asked[] = [];

  constructor(private readonly store: Pick<ProjectStore, 'knownSources'>) {}

  /** The name of the sweep that holds these bytes. */
  nameOf(sha256: string): Promise<string | undefined> {
    if (this.asked.length === 0) setTimeout(() => void this.ask(), GATHER_MS);
    return new Promise((answer) => this.asked.push({ sha256, answer }));
  }

  private async ask(): Promise<void> {
    const asked = this.asked.splice(0, MOST_AT_ONCE);
    if (this.asked.length > 0) setTimeout(() => void this.ask(), 0);
    // Not being able to ask is no reason to hold a file back: storing it asks again.
    const known = await this.store.knownSources(asked.map(({ sha256 }) => sha256)).catch(() => []);
    for (const { sha256, answer } of asked) answer(known.find((file) => file.sha256 === sha256)?.name);
  }
}
