import { type Remote, wrap } from 'comlink';
import { text } from '../../shared/text.js';

/** Work that is under way. `stop` really ends it: the worker that does it is terminated at once. */
export interface Job<T> {
  readonly done: Promise<T>;
  stop(): void;
}

/** The person pressed Stop: not a failure, nothing to show. */
export class JobStopped extends Error {
  override readonly name = 'JobStopped';
  constructor() {
    super(text.errors.stoppedDetail);
  }
}
/** The worker ended by itself: out of memory, or its code could not be loaded. */
export class WorkerEnded extends Error {
  override readonly name = 'WorkerEnded';
  constructor(detail: string) {
    super(detail ? `${text.errors.workerDetail} (${detail})` : text.errors.workerDetail);
  }
}

interface Member<Api> {
  readonly worker: Worker;
  readonly api: Remote<Api>;
}
interface Waiting<Api> {
  begin(member: Member<Api>): void;
}

/** A handful of workers of one kind. They start when first needed and are used again. */
export class WorkerPool<Api> {
  private readonly idle: Member<Api>[] = [];
  private readonly queue: Waiting<Api>[] = [];
  private working = 0;

  constructor(
    private readonly startWorker: () => Worker,
    private readonly most: number,
  ) {}

  /** Starts a worker before it is needed, so that the first job finds it loaded. */
  warm(): void {
    if (this.idle.length + this.working === 0) this.idle.push(this.start());
  }

  run<T>(task: (api: Remote<Api>) => Promise<T>): Job<T> {
    let stop = () => {};
    const done = new Promise<T>((resolve, reject) => {
      const waiting: Waiting<Api> = {
        begin: (member) => {
          const running = this.attend(member, task(member.api));
          stop = running.stop;
          running.done.then(resolve, reject);
        },
      };
      stop = () => {
        stop = () => {}; // a second press finds nothing of this job any more
        const index = this.queue.indexOf(waiting);
        if (index >= 0) this.queue.splice(index, 1);
        reject(new JobStopped());
      };
      this.queue.push(waiting);
      this.next();
    });
    return { done, stop: () => stop() };
  }

  private start(): Member<Api> {
    const worker = this.startWorker();
    return { worker, api: wrap<Api>(worker) };
  }

  private next(): void {
    if (this.working >= this.most) return;
    const waiting = this.queue.shift();
    if (!waiting) return;
    this.working += 1;
    waiting.begin(this.idle.pop() ?? this.start());
  }

  /** Waits for a task of this member, and puts the member back, or another in its place, when it is over. */
  private attend<T>(member: Member<Api>, answer: Promise<T>): Job<T> {
    const { worker } = member;
    let isOver = false;
    let fail: (reason: Error) => void = () => {};
    const finish = (isUsable: boolean) => {
      if (isOver) return false;
      isOver = true;
      worker.onerror = null;
      if (!isUsable) worker.terminate();
      this.idle.push(isUsable ? member : this.start());
      this.working -= 1;
      this.next();
      return true;
    };
    const done = new Promise<T>((resolve, reject) => {
      fail = reject;
      answer.then(
        (value) => finish(true) && resolve(value),
        (reason: unknown) => finish(true) && reject(reason),
      );
      worker.onerror = (event) => {
        event.preventDefault();
        if (finish(false)) reject(new WorkerEnded(event.message ?? ''));
      };
    });
    return {
      done,
      stop: () => {
        if (finish(false)) fail(new JobStopped());
      },
    };
  }
}
