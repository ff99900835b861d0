import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import Database from 'better-sqlite3';
import { io } from 'socket.io-client';
import request from 'supertest';
import { DataSource, type MigrationInterface, type QueryRunner } from 'typeorm';
import { afterAll, afterEach, describe, expect, it } from 'vitest';
import type { Config } from '@/server/config';
import { makeDataSource } from '@/server/data-source';
import { listBackups } from '@/server/backup-files';
import { databaseFile } from '@/server/data-files';
import { makeLog } from '@/server/middleware/request-log';
import { migrate } from '@/server/migrate';
import { migrations } from '@/server/migrations/all';
import { makeLocalCertificate } from '@/server/local-certificate';
import { startServer, type RunningServer } from '@/server/start-server';
import { cookiesOf } from '@/tests/support/cookies';
import { testConfig } from '@/tests/support/server';
import { firstWorkshop } from '@/tests/support/first-workshop';

const root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-start-'));
afterAll(() => fs.rmSync(root, { recursive: true, force: true }));
let folders = 0;
const newFolder = () => path.join(root, String(++folders));
const log = makeLog('silent');
const configFor = (dataDir: string, change: Partial<Config> = {}): Config => ({
  ...testConfig,
  dataDir,
  ...change,
});

const running: RunningServer[] = [];
const start = async (dataDir: string, change?: Partial<Config>) => {
  const server = await startServer(configFor(dataDir, change), log);
  running.push(server);
  return server;
};
afterEach(async () => {
  for (const server of running.splice(0)) await server.stop();
});
const mode = (file: string) => (fs.statSync(file).mode & 0o777).toString(8);

describe('the first start', () => {
  it('removes the file of a photo that a crash has left two hours before', async () => {
    const folder = newFolder();
    const left = path.join(folder, 'photos', `${'c'.repeat(32)}.jpg`);
    fs.mkdirSync(path.dirname(left), { recursive: true });
    fs.writeFileSync(left, 'picture');
    const then = new Date(Date.now() - 2 * 3_600_000);
    fs.utimesSync(left, then, then);
    await start(folder);
    expect(fs.existsSync(left)).toBe(false);
  });

  it('makes the data folder, the secret for its owner only, the tables, and is ready', async () => {
    const folder = newFolder();
    const server = await start(folder);
    expect(mode(folder)).toBe('700');
    expect(mode(path.join(folder, 'secret.key'))).toBe('600');
    const agent = request(server.address);
    expect((await agent.get('/readyz')).body).toEqual({ status: 'ready' });
    expect((await agent.get('/api/front-door')).body).toMatchObject({ empty: true });
  });

  it('serves a person from real bcrypt to a session, which the next start still knows', async () => {
    const folder = newFolder();
    const first = await start(folder);
    const created = await request(first.address).post('/api/workshops').send(firstWorkshop);
    expect(created.status).toBe(201);
    const cookie = Object.entries(cookiesOf(created))
      .map(([name, { value }]) => `${name}=${value}`)
      .join('; ');
    const { email, password } = firstWorkshop;
    expect((await request(first.address).post('/api/session').send({ email, password })).status).toBe(200);
    expect((await request(first.address).post('/api/session').send({ email, password: 'not this' })).status).toBe(401);
    await first.stop();
    running.pop();
    expect(fs.readdirSync(folder).sort()).toEqual(['bidewell.sqlite', 'push.key', 'secret.key', 'server.lock']);
    const second = await start(folder);
    expect((await request(second.address).get('/api/session').set('Cookie', cookie)).body.person.email).toBe(email);
  });

  it('is refused with what to do where the port is taken or the address is not of this machine', async () => {
    const taken = net.createServer().listen(0, '127.0.0.1');
    await new Promise((resolve) => taken.once('listening', resolve));
    const { port } = taken.address() as net.AddressInfo;
    await expect(start(newFolder(), { port })).rejects.toThrow(`Port ${port} is taken`);
    await expect(start(newFolder(), { host: '203.0.113.254' })).rejects.toThrow('BIDEWELL_HOST');
    await new Promise((resolve) => taken.close(resolve));
  });

  it('is refused where the secret is damaged, rather than making every session void in silence', async () => {
    const folder = newFolder();
    await (await start(folder)).stop();
    running.pop();
    fs.writeFileSync(path.join(folder, 'secret.key'), 'short');
    await expect(start(folder)).rejects.toThrow('damaged');
  });
});

describe('over https', () => {
  it('speaks it by itself, binds its cookies to the host, and takes sockets by them', async () => {
    const { chain, key, issuer } = await makeLocalCertificate(['localhost', '127.0.0.1'], new Date());
    const server = await start(newFolder(), { tls: { cert: chain, key } });
    expect(server.address).toMatch(/^https:\/\/127\.0\.0\.1:/);
    const created = await request(server.address).post('/api/workshops').ca(issuer).send(firstWorkshop);
    expect(created.status).toBe(201);
    const cookies = cookiesOf(created);
    expect(Object.keys(cookies).sort()).toEqual([
      '__Host-bidewell_access',
      '__Host-bidewell_device',
      '__Host-bidewell_refresh',
    ]);
    for (const { attributes } of Object.values(cookies)) expect(attributes).toContain('Secure');
    const cookie = `__Host-bidewell_access=${cookies['__Host-bidewell_access']?.value}`;
    const socket = io(server.address, {
      ca: issuer,
      transports: ['websocket'],
      extraHeaders: { cookie, origin: server.address },
      reconnection: false,
    } as Parameters<typeof io>[1]);
    await new Promise<void>((resolve, reject) => {
      socket.on('connect', () => resolve());
      socket.on('connect_error', reject);
    });
    socket.disconnect();
  });
});

class Later9999999999999 implements MigrationInterface {
  readonly name = 'Later9999999999999';
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('CREATE TABLE later (id varchar PRIMARY KEY)');
  }
  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE later');
  }
}

describe('a migration', () => {
  it('of a database that holds something begins with a copy of it', async () => {
    const folder = newFolder();
    const first = await start(folder);
    await request(first.address).post('/api/workshops').send(firstWorkshop);
    await first.stop();
    running.pop();
    expect(fs.existsSync(path.join(folder, 'backups'))).toBe(false);

    const later = await new DataSource({
      ...makeDataSource(databaseFile(folder)).options,
      migrations: [...migrations, Later9999999999999],
    }).initialize();
    expect(await migrate(later, folder, Date.now(), log)).toEqual(['Later9999999999999']);
    expect(await migrate(later, folder, Date.now(), log)).toEqual([]);
    await later.destroy();
    const backups = listBackups(path.join(folder, 'backups'));
    expect(backups).toHaveLength(1);
    const copy = new Database(backups[0]!.file, { readonly: true });
    expect(copy.prepare('SELECT email FROM person').all()).toEqual([{ email: 'alva@example.com' }]);
    expect(copy.prepare("SELECT name FROM sqlite_master WHERE name = 'later'").all()).toEqual([]);
    copy.close();

    // And the version before it does not touch what it does not know.
    await expect(start(folder)).rejects.toThrow('later version');
  });
});
