import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { fromRoot } from '@/server/cli/tools.mjs';

export interface LaunchOptions {
  /** Seed the demo workshop. Off: an empty installation that offers *create a workshop*. */
  demo?: boolean;
  /** More environment for the server, such as BIDEWELL_TLS_CERT. */
  env?: Record<string, string>;
  /** A data folder to use again; without it a fresh one is made and removed by `stop`. */
  dataDir?: string;
  /** The port of a server that ran before; without it a free one. */
  port?: number;
  /** How far the server's clock goes ahead of the machine's, ms. */
  clockAheadMs?: number;
}

export interface Launched {
  /** Address without a slash at the end. */
  url: string;
  port: number;
  dataDir: string;
  pid: number;
  /** What the server has written so far, errors included. */
  output: () => string;
  /** Asks the server to end (SIGTERM), waits, and removes the data folder unless it was given or is to be kept. */
  stop: (options?: { keepData?: boolean; signal?: NodeJS.Signals }) => Promise<number | null>;
}

/** A port that was free a moment ago. */
export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.on('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() =>
        address && typeof address === 'object' ? resolve(address.port) : reject(new Error('no port')),
      );
    });
  });
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Waits until /readyz answers 200; throws with the server's own words when it ends or takes longer than 180 s. */
async function untilReady(url: string, child: ChildProcess, output: () => string): Promise<void> {
  const deadline = Date.now() + 180_000;
  while (Date.now() < deadline) {
    if (child.exitCode !== null) throw new Error(`the server ended with ${child.exitCode}:\n${output()}`);
    const ready = await fetch(`${url}/readyz`).then(
      (answer) => answer.status === 200,
      () => false,
    );
    if (ready) return;
    await pause(100);
  }
  throw new Error(`the server was not ready within 180 s:\n${output()}`);
}

/**
 * Starts the built server (dist-server/main.js, web app from dist/) on a free port of 127.0.0.1.
 * @throws Error when it was not built or does not get ready.
 */
export async function launch(options: LaunchOptions = {}): Promise<Launched> {
  const { demo = true, env = {}, dataDir, port: wished, clockAheadMs = 0 } = options;
  const main = fromRoot('dist-server/main.js');
  if (!fs.existsSync(main))
    throw new Error('The server is not built. Run `npm run build` first; `npm test` does it by itself.');
  const folder = dataDir ?? fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-test-'));
  const port = wished ?? (await freePort());
  const clock = clockAheadMs === 0 ? [] : ['--import', fromRoot('tests/support/set-clock.mjs')];
  const child = spawn(process.execPath, ['--enable-source-maps', ...clock, main], {
    cwd: fromRoot('.'),
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      PORT: String(port),
      BIDEWELL_HOST: '127.0.0.1',
      BIDEWELL_DATA: folder,
      BIDEWELL_DEMO: demo ? 'on' : 'off',
      BIDEWELL_LOG: 'info',
      BIDEWELL_BACKUP_HOURS: '0',
      CLOCK_AHEAD_MS: String(clockAheadMs),
      ...env,
    },
  });
  let text = '';
  child.stdout.on('data', (chunk: Buffer) => (text += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (text += chunk.toString()));
  const ended = new Promise<number | null>((resolve) => child.on('exit', (status) => resolve(status)));
  const url = `http://127.0.0.1:${port}`;

  const stop: Launched['stop'] = async ({ keepData = false, signal = 'SIGTERM' } = {}) => {
    if (child.exitCode === null && child.signalCode === null) child.kill(signal);
    const last = setTimeout(() => child.kill('SIGKILL'), 20_000);
    const status = await ended;
    clearTimeout(last);
    if (!keepData && !dataDir) fs.rmSync(folder, { recursive: true, force: true });
    return status;
  };
  try {
    await untilReady(url, child, () => text);
  } catch (error) {
    await stop({ signal: 'SIGKILL' });
    throw error;
  }
  return { url, port, dataDir: folder, pid: child.pid ?? 0, output: () => text, stop };
}
