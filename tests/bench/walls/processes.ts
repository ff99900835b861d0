/** Processes of the bench that ask each other by name, over Node's own channel. */
import { fork, type ChildProcess } from 'node:child_process';
import { fileURLToPath } from 'node:url';

interface Question {
  id: number;
  name: string;
  value: unknown;
}
interface Reply {
  id: number;
  value?: unknown;
  error?: string;
}

export interface Helper {
  pid: number;
  ask<Answer>(name: string, value?: unknown): Promise<Answer>;
  /** Ends it; `SIGKILL` without a word. */
  stop(signal?: NodeJS.Signals): Promise<void>;
}

/** Epoch ms with its fraction: the processes are on one machine and so on one clock. */
export const preciseNow = (): number => performance.timeOrigin + performance.now();

/** Starts a file of this folder as a process of its own, with a collector that can be asked. */
export async function startHelper(file: string, args: (string | number)[] = []): Promise<Helper> {
  const child: ChildProcess = fork(fileURLToPath(new URL(file, import.meta.url)), args.map(String), {
    execArgv: ['--import', 'tsx', '--expose-gc'],
    serialization: 'advanced',
  });
  const open = new Map<number, { resolve: (value: unknown) => void; reject: (error: Error) => void }>();
  const ended = new Promise<void>((resolve) =>
    child.once('exit', (code, signal) => {
      for (const { reject } of open.values()) reject(new Error(`${file} ended with ${code ?? signal}`));
      open.clear();
      resolve();
    }),
  );
  child.on('message', ({ id, value, error }: Reply) => {
    const asked = open.get(id);
    open.delete(id);
    if (error !== undefined) asked?.reject(new Error(`${file}: ${error}`));
    else asked?.resolve(value);
  });
  let last = 0;
  const helper: Helper = {
    pid: child.pid ?? 0,
    ask: <Answer>(name: string, value?: unknown) =>
      new Promise<Answer>((resolve, reject) => {
        const id = (last += 1);
        open.set(id, { resolve: resolve as (value: unknown) => void, reject });
        child.send({ id, name, value } satisfies Question);
      }),
    async stop(signal = 'SIGTERM') {
      child.kill(signal);
      await ended;
    },
  };
  await helper.ask('up');
  return helper;
}

/** The other end: answers what it is asked until its starter is gone. */
// Each name has its own value; the starter knows which.
export function answerQuestions(answers: Record<string, (value: never) => unknown>): void {
  process.on('message', ({ id, name, value }: Question) => {
    const answer = name === 'up' ? () => true : answers[name];
    Promise.resolve()
      .then(() => {
        if (!answer) throw new Error(`nothing is called ${name}`);
        return answer(value as never);
      })
      .then(
        (given) => process.send?.({ id, value: given } satisfies Reply),
        (error: unknown) =>
          process.send?.({
            id,
            error: error instanceof Error ? (error.stack ?? error.message) : String(error),
          } satisfies Reply),
      );
  });
  process.on('disconnect', () => process.exit(0));
}
