import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import http from 'node:http';
import os from 'node:os';
import path from 'node:path';
import Database from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { listBackups } from '@/server/backup-files';
import { databaseFile } from '@/server/data-files';
import { bundleServer } from '@/server/cli/bundle.mjs';
import { firstWorkshop } from '@/tests/support/first-workshop';

const root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-process-'));
afterAll(() => fs.rmSync(root, { recursive: true, force: true }));
let folders = 0;
const newFolder = () => path.join(root, String(++folders));
const mode = (file: string) => (fs.statSync(file).mode & 0o777).toString(8);

const bundle = path.join(process.cwd(), 'node_modules/.cache/bidewell-process-test');
const children: ChildProcess[] = [];
beforeAll(() => bundleServer(bundle));
afterAll(() => {
  for (const child of children) if (child.exitCode === null) child.kill('SIGKILL');
  fs.rmSync(bundle, { recursive: true, force: true });
});

function spawnServer(folder: string, env: Record<string, string> = {}) {
  const child = spawn(process.execPath, [path.join(bundle, 'main.js')], {
    env: {
      ...process.env,
      PORT: '0',
      BIDEWELL_DATA: folder,
      BIDEWELL_DEMO: 'off',
      BIDEWELL_HOST: '127.0.0.1',
      BIDEWELL_BACKUP_HOURS: '0',
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  children.push(child);
  const told: unknown[] = [];
  child.on('message', (message) => told.push(message));
  let output = '';
  child.stdout?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  child.stderr?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  const exit = new Promise<number | null>((resolve) => child.once('exit', resolve));
  /** Waits until the process has written something of this form; gives its first group. */
  const said = async (form: RegExp): Promise<string> => {
    for (;;) {
      const found = form.exec(output);
      if (found) return found[1] ?? '';
      if (child.exitCode !== null) throw new Error(`The server ended: ${output}`);
      await new Promise((resolve) => setTimeout(resolve, 20));
    }
  };
  return { child, exit, said, told, output: () => output };
}

/** Begins to send a body and stops half way, when the server has read the head and asked for more. */
async function halfARequest(address: string) {
  const { hostname, port } = new URL(address);
  const body = JSON.stringify(firstWorkshop);
  const headers = {
    'content-type': 'application/json',
    'content-length': Buffer.byteLength(body),
    expect: '100-continue',
  };
  const sent = http.request({ hostname, port, path: '/api/workshops', method: 'POST', headers });
  const status = new Promise<number>((resolve, reject) => {
    sent.on('response', (response) => resolve(response.resume().statusCode ?? 0));
    sent.on('error', reject);
  });
  status.catch(() => {});
  await new Promise((resolve) => {
    sent.once('continue', resolve);
    sent.flushHeaders();
  });
  sent.write(body.slice(0, 20));
  return { status, finish: () => sent.end(body.slice(20)) };
}

describe('the process', () => {
  it('on SIGTERM lets the request under way end, empties the write-ahead log and exits with 0', async () => {
    const folder = newFolder();
    const { child, exit, said } = spawnServer(folder);
    const { status, finish } = await halfARequest(await said(/"address":"([^"]+)"/));
    child.kill('SIGTERM');
    await said(/"stopping"/);
    finish();
    expect(await status).toBe(201);
    expect(await exit).toBe(0);
    expect(fs.readdirSync(folder).sort()).toEqual(['bidewell.sqlite', 'push.key', 'secret.key', 'server.lock']);
    expect(mode(databaseFile(folder))).toBe('600');
    const database = new Database(databaseFile(folder), { readonly: true });
    expect(database.prepare('SELECT email FROM person').all()).toEqual([{ email: 'alva@example.com' }]);
    database.close();
  });

  it('on a second signal does not wait for the request under way, and exits with 1', async () => {
    const { child, exit, said } = spawnServer(newFolder());
    const { status } = await halfARequest(await said(/"address":"([^"]+)"/));
    child.kill('SIGTERM');
    await said(/"stopping"/);
    child.kill('SIGTERM');
    expect(await exit).toBe(1);
    await expect(status).rejects.toThrow();
  });

  it('tells whoever started it where it listens, also where the port was chosen for it', async () => {
    const { child, exit, said, told } = spawnServer(newFolder(), { BIDEWELL_HOST: '0.0.0.0' });
    const address = await said(/"address":"([^"]+)"/);
    const { port } = new URL(address);
    expect(Number(port)).toBeGreaterThan(0);
    await expect
      .poll(() => told)
      .toEqual([{ ready: { address: `http://localhost:${port}`, port: Number(port), demo: false, everywhere: true } }]);
    child.kill('SIGTERM');
    expect(await exit).toBe(0);
  });

  it('beside one that has the port tells nothing of being ready, says that the port is taken, and exits with 1', async () => {
    const first = spawnServer(newFolder());
    const { port } = new URL(await first.said(/"address":"([^"]+)"/));
    const second = spawnServer(newFolder(), { PORT: port });
    expect(await second.exit).toBe(1);
    expect(second.output()).toContain(`Port ${port} is taken`);
    expect(second.told).toEqual([]);
    first.child.kill('SIGTERM');
    expect(await first.exit).toBe(0);
  });

  it('on a folder that another one works on says so and exits with 1; after that one was killed it starts', async () => {
    const folder = newFolder();
    const first = spawnServer(folder);
    await first.said(/"address":"([^"]+)"/);
    const second = spawnServer(folder);
    expect(await second.exit).toBe(1);
    expect(second.output()).toContain(`Another Bidewell works on ${folder}`);
    expect(second.told).toEqual([]);
    first.child.kill('SIGKILL');
    await first.exit;
    const third = spawnServer(folder);
    await third.said(/"address":"([^"]+)"/);
    third.child.kill('SIGTERM');
    expect(await third.exit).toBe(0);
  });

  it('copies its data by the clock into the backups, where there is none yet', async () => {
    const folder = newFolder();
    const server = spawnServer(folder, { BIDEWELL_BACKUP_HOURS: '1' });
    await server.said(/"address":"([^"]+)"/);
    await server.said(/(data copied)/);
    const copies = listBackups(path.join(folder, 'backups'));
    expect(copies).toHaveLength(1);
    expect(path.basename(copies[0]!.file)).toMatch(/^bidewell-clock-.*\.sqlite$/);
    server.child.kill('SIGTERM');
    expect(await server.exit).toBe(0);
  });

  it('with a setting that cannot be says which, and exits with 1', async () => {
    const { exit, output } = spawnServer(newFolder(), { PORT: 'eighty' });
    expect(await exit).toBe(1);
    expect(output()).toContain('PORT');
  });
});
