import { Worker } from 'node:worker_threads';

export interface PoolTask<Task> {
  id: number;
  task: Task;
}
export type PoolAnswer<Result> = { id: number; result: Result } | { id: number; error: string };

export interface PoolOptions {
  /** Name of the entry in server/workers, without its ending. */
  entry: string;
  /** Threads at most. */
  size: number;
  /** More tasks than this wait for nobody. */
  longestQueue: number;
  /** What a task is refused with while that many wait. */
  tooMany: () => Error;
  /** A task that takes longer is given up and its thread replaced, ms; left out: it takes what it takes. */
  patienceMs?: number;
}

interface Waiting<Task, Result> {
  task: PoolTask<Task>;
  resolve: (result: Result) => void;
  reject: (error: Error) => void;
  timer?: NodeJS.Timeout;
}

/** In the bundle everything of ours is one file with the workers beside it; in the sources a worker is TypeScript. */
const isBundled = import.meta.url.endsWith('.js');
const workerOf = (entry: string): Worker =>
  isBundled
    ? new Worker(new URL(`./workers/${entry}.js`, import.meta.url))
    : new Worker(new URL('../workers/from-source.mjs', import.meta.url), { workerData: { entry: `./${entry}.ts` } });

/** Worker threads with one queue. Threads start with the first task; one that dies is replaced, and its task fails. */
export class WorkerPool<Task, Result> {
  private readonly idle: Worker[] = [];
  private readonly busy = new Map<Worker, Waiting<Task, Result>>();
  private readonly queue: Waiting<Task, Result>[] = [];
  private nextId = 1;
  private closed = false;

  constructor(private readonly options: PoolOptions) {}

  run(task: Task): Promise<Result> {
    const { longestQueue, tooMany, entry } = this.options;
    if (this.closed) return Promise.reject(new Error(`The threads of ${entry} are closed.`));
    if (this.queue.length >= longestQueue) return Promise.reject(tooMany());
    return new Promise((resolve, reject) => {
      this.queue.push({ task: { id: this.nextId++, task }, resolve, reject });
      this.next();
    });
  }

  async close(): Promise<void> {
    this.closed = true;
    const ended = new Error('The server is stopping.');
    for (const waiting of this.queue.splice(0)) waiting.reject(ended);
    for (const { timer } of this.busy.values()) clearTimeout(timer);
    await Promise.all([...this.idle.splice(0), ...this.busy.keys()].map((worker) => worker.terminate()));
  }

  private next(): void {
    if (this.queue.length === 0) return;
    const worker = this.idle.pop() ?? (this.busy.size < this.options.size ? this.start() : undefined);
    if (!worker) return;
    const waiting = this.queue.shift();
    if (!waiting) return;
    this.busy.set(worker, waiting);
    const { patienceMs, entry } = this.options;
    if (patienceMs !== undefined)
      waiting.timer = setTimeout(() => {
        waiting.reject(new Error(`A task of ${entry} took longer than ${patienceMs} ms and was given up.`));
        void worker.terminate();
      }, patienceMs);
    worker.ref(); // Somebody waits for it.
    worker.postMessage(waiting.task);
  }

  private start(): Worker {
    const worker = workerOf(this.options.entry);
    worker.unref();
    worker.on('message', (answer: PoolAnswer<Result>) => {
      const waiting = this.busy.get(worker);
      clearTimeout(waiting?.timer);
      this.busy.delete(worker);
      worker.unref();
      if (!this.closed) this.idle.push(worker);
      if ('error' in answer) waiting?.reject(new Error(`${this.options.entry} failed: ${answer.error}`));
      else waiting?.resolve(answer.result);
      this.next();
    });
    const gone = (error: Error) => {
      const waiting = this.busy.get(worker);
      clearTimeout(waiting?.timer);
      waiting?.reject(error);
      this.busy.delete(worker);
      const at = this.idle.indexOf(worker);
      if (at >= 0) this.idle.splice(at, 1);
      if (!this.closed) this.next();
    };
    worker.on('error', gone);
    worker.on('exit', () => gone(new Error(`A thread of ${this.options.entry} ended.`)));
    return worker;
  }
}
