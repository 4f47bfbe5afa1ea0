import type { ProjectEvent } from '../../shared/contracts/project-event.js';

/** Events that wait for one open stream. */
export class EventInbox {
  private events: ProjectEvent[] = [];
  private hasGap = true; // at first nothing is known of what came before
  private hasEnded = false;
  private wake: () => void = () => {};

  constructor(private readonly onClose: () => void) {}

  get isOver(): boolean {
    return this.hasEnded;
  }

  put(event: ProjectEvent): void {
    this.events.push(event);
    this.wake();
  }

  /** Something may have been missed: the rows have to be asked. */
  noteGap(): void {
    this.hasGap = true;
    this.wake();
  }

  takeGap(): boolean {
    const had = this.hasGap;
    this.hasGap = false;
    return had;
  }

  take(): ProjectEvent[] {
    return this.events.splice(0);
  }

  /** Until something is here, the inbox ends, or the time is over. */
  wait(timeMs: number): Promise<void> {
    if (this.hasEnded || this.hasGap || this.events.length > 0) return Promise.resolve();
    return new Promise((resolve) => {
      const timer = setTimeout(resolve, timeMs);
      this.wake = () => {
        clearTimeout(timer);
        resolve();
      };
    });
  }

  /** The server ends: whoever waits goes. */
  end(): void {
    this.hasEnded = true;
    this.wake();
  }

  close(): void {
    this.onClose();
    this.end();
  }
}
