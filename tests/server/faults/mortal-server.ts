/** The bundled server as a process that is killed without warning and started again over its data, on a clock set by hand. */
import { spawn, type ChildProcess } from 'node:child_process';
import path from 'node:path';
import { freePort } from '@/tests/support/launch';

export interface MortalServer {
  url: string;
  /** Ends when the present process takes requests. */
  ready(): Promise<void>;
  /** SIGKILL; the next process starts when this one is gone. */
  kill(): void;
  kills(): number;
  /** The server's time, epoch ms. */
  now(): number;
  advance(ms: number): void;
  /** What all its processes have written. */
  output(): string;
  /** Ends it properly. @returns its status */
  stop(): Promise<number | null>;
}

interface Life {
  child: ChildProcess;
  ready: Promise<void>;
  gone: Promise<number | null>;
}

/** @param bundle folder with main.js and set-clock.js */
export async function startMortal(
  bundle: string,
  dataDir: string,
  startAt: number,
  env: Record<string, string>,
): Promise<MortalServer> {
  const port = await freePort();
  let aheadMs = startAt - Date.now();
  let output = '';
  let kills = 0;
  let stopping = false;

  function begin(): Life {
    const child = spawn(
      process.execPath,
      ['--import', path.join(bundle, 'set-clock.js'), path.join(bundle, 'main.js')],
      {
        env: {
          ...process.env,
          PORT: String(port),
          BIDEWELL_HOST: '127.0.0.1',
          BIDEWELL_DATA: dataDir,
          BIDEWELL_DEMO: 'off',
          BIDEWELL_BACKUP_HOURS: '0',
          BIDEWELL_LOG: 'warn',
          CLOCK_AHEAD_MS: String(aheadMs),
          ...env,
        },
        stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
      },
    );
    for (const stream of [child.stdout, child.stderr])
      stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
    const gone = new Promise<number | null>((resolve) => child.once('exit', resolve));
    const ready = new Promise<void>((resolve, reject) => {
      child.on('message', (message) => {
        if ((message as { ready?: object }).ready) resolve();
      });
      void gone.then((status) => reject(new Error(`The server ended with ${status} before it was ready:\n${output}`)));
    });
    // Heard by whoever waits for it; a killed one is waited for by nobody.
    ready.catch(() => {});
    return { child, ready, gone };
  }

  let life = begin();
  let next: Promise<void> | null = null;
  return {
    url: `http://127.0.0.1:${port}`,
    async ready() {
      for (;;) {
        while (next) await next;
        const present = life;
        try {
          await present.ready;
          return;
        } catch (error) {
          // One that was killed while it started is followed by another.
          if (present === life && !next) throw error;
        }
      }
    },
    kill() {
      if (next || stopping) return;
      kills += 1;
      const { child, gone } = life;
      child.kill('SIGKILL');
      next = gone.then(() => {
        life = begin();
        next = null;
      });
    },
    kills: () => kills,
    now: () => Date.now() + aheadMs,
    advance(ms) {
      aheadMs += Math.round(ms);
      if (!next && life.child.connected) life.child.send({ clockAheadMs: aheadMs });
    },
    output: () => output,
    async stop() {
      stopping = true;
      while (next) await next;
      // One that still starts does not yet know how to end properly.
      await life.ready;
      life.child.kill('SIGTERM');
      return life.gone;
    },
  };
}
