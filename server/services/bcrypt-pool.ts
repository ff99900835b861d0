import os from 'node:os';
import { Worker } from 'node:worker_threads';
import { DomainError } from '../errors/domain-error';

export type BcryptTask = { id: number; password: string } & ({ cost: number } | { hash: string });
export type BcryptAnswer = { id: number; result: string | boolean } | { id: number; error: string };
type WithoutId<T> = T extends unknown ? Omit<T, 'id'> : never;

interface Waiting {
  task: BcryptTask;
  resolve: (result: string | boolean) => void;
  reject: (error: Error) => void;
}

/** More than this many waiting means minutes of waiting: say so instead. */
const longestQueue = 100;

/** In the bundle everything of ours is one file with the workers beside it; in the sources a worker is TypeScript. */
const workerFile = import.meta.url.endsWith('.js')
  ? new URL('./workers/bcrypt.js', import.meta.url)
  : new URL('../workers/bcrypt-from-source.mjs', import.meta.url);

/**
 * Worker threads with one queue. Threads start with the first task; one that dies is replaced, and its task fails.
 * On two cores one thread hashes, so that the other core serves.
 */
export class BcryptPool {
  private readonly idle: Worker[] = [];
  private readonly busy = new Map<Worker, Waiting>();
  private readonly queue: Waiting[] = [];
  private nextId = 1;
  private closed = false;

  constructor(private readonly size = Math.max(1, Math.min(2, os.availableParallelism() - 1))) {}

  run(task: WithoutId<BcryptTask>): Promise<string | boolean> {
    if (this.closed) return Promise.reject(new Error('The hashing threads are closed.'));
    if (this.queue.length >= longestQueue)
      return Promise.reject(
        new DomainError(503, 'busy', 'Too many people sign in at this moment. Try again shortly.', { retryAfterS: 10 }),
      );
    return new Promise((resolve, reject) => {
      this.queue.push({ task: { ...task, id: this.nextId++ } as BcryptTask, resolve, reject });
      this.next();
    });
  }

  async close(): Promise<void> {
    this.closed = true;
    const ended = new Error('The server is stopping.');
    for (const waiting of this.queue.splice(0)) waiting.reject(ended);
    await Promise.all([...this.idle.splice(0), ...this.busy.keys()].map((worker) => worker.terminate()));
  }

  private next(): void {
    if (this.queue.length === 0) return;
    const worker = this.idle.pop() ?? (this.busy.size < this.size ? this.start() : undefined);
    if (!worker) return;
    const waiting = this.queue.shift();
    if (!waiting) return;
    this.busy.set(worker, waiting);
    worker.ref(); // Somebody waits for it.
    worker.postMessage(waiting.task);
  }

  private start(): Worker {
    const worker = new Worker(workerFile);
    worker.unref();
    worker.on('message', (answer: BcryptAnswer) => {
      const waiting = this.busy.get(worker);
      this.busy.delete(worker);
      worker.unref();
      if (!this.closed) this.idle.push(worker);
      if ('error' in answer) waiting?.reject(new Error(`Hashing failed: ${answer.error}`));
      else waiting?.resolve(answer.result);
      this.next();
    });
    const gone = (error: Error) => {
      this.busy.get(worker)?.reject(error);
      this.busy.delete(worker);
      const at = this.idle.indexOf(worker);
      if (at >= 0) this.idle.splice(at, 1);
      if (!this.closed) this.next();
    };
    worker.on('error', gone);
    worker.on('exit', () => gone(new Error('A hashing thread ended.')));
    return worker;
  }
}
