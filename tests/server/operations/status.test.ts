import Database from 'better-sqlite3';
import fs from 'node:fs';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { databaseFile, prepareDataFolder } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { makeMetrics } from '@/server/services/metrics';
import { queryLog } from '@/server/middleware/query-log';
import { makeLog } from '@/server/middleware/request-log';
import packageJson from '@/package.json';
import { makeTestServer, testNow, type TestServer } from '@/tests/support/server';

const token = 'a token of 24 characters';
let server: TestServer;
beforeEach(async () => {
  server = await makeTestServer({ config: { metricsToken: token }, deps: { metrics: makeMetrics('1.2.3') } });
  prepareDataFolder(server.deps.config.dataDir);
  new Database(databaseFile(server.deps.config.dataDir)).exec('CREATE TABLE note (text TEXT)').close();
});
afterEach(() => server.close());

test('the manager sees version, start, sizes and copies; a copy made by hand is there at once', async () => {
  server.clock.advance(90_000);
  const manager = server.agentFor('manager');
  const first = (await manager.get('/api/status').expect(200)).body;
  expect(first).toMatchObject({
    version: packageJson.version,
    startedAt: new Date(testNow).toISOString(),
    at: new Date(testNow + 90_000).toISOString(),
    databaseBytes: fs.statSync(databaseFile(server.deps.config.dataDir)).size,
    backups: { everyHours: 0, count: 0, latest: [], failed: null },
    overdueLooks: 0,
    outbox: { waiting: 0, dead: 0 },
  });
  const after = (await manager.post('/api/status/backup').expect(200)).body;
  expect(after.backups).toMatchObject({ count: 1, latest: [{ at: new Date(testNow + 90_000).toISOString() }] });
  await server.agentFor('foreman').get('/api/status').expect(403);
  await server.agentFor('foreman').post('/api/status/backup').expect(403);
});

test('a copy that cannot be made is a 503 with the reason, and the status names it', async () => {
  fs.rmSync(databaseFile(server.deps.config.dataDir));
  const answer = await server.agentFor('manager').post('/api/status/backup').expect(503);
  expect(answer.body).toMatchObject({ code: 'not_backed_up' });
  expect(answer.body.detail).toContain('There is no database');
  const { failed } = (await server.agentFor('manager').get('/api/status')).body.backups;
  expect(failed).toMatchObject({ at: new Date(testNow).toISOString() });
});

test('the figures of the process open to the token alone, and count three requests by their declared path', async () => {
  await server.anyone.get('/metrics').expect(401);
  await server.anyone.get('/metrics').set('Authorization', 'Bearer wrong token of some length').expect(401);
  await server.agentFor('manager').get('/metrics').expect(401);
  const foreman = server.agentFor('foreman');
  for (const id of ['a', 'b', 'c']) await foreman.get(`/api/charges/${id}`).expect(404);
  const { text, headers } = await server.anyone.get('/metrics').set('Authorization', `Bearer ${token}`).expect(200);
  expect(headers['content-type']).toContain('text/plain');
  expect(text).toContain('bidewell_http_request_seconds_count{method="GET",route="/api/charges/:id",status="404"} 3');
  expect(text).toContain('bidewell_build{version="1.2.3"} 1');
  expect(text).not.toContain('/api/charges/a');
  const closed = await makeTestServer({ empty: true });
  await closed.anyone.get('/metrics').set('Authorization', `Bearer ${token}`).expect(404);
  await closed.close();
});

test('a statement of over 100 ms is in the log without what was typed, and counted', async () => {
  const lines: string[] = [];
  const metrics = makeMetrics('1.2.3');
  const log = makeLog('warn', { write: (line: string) => void lines.push(line) });
  const dataSource = await makeDataSource(':memory:', queryLog(log, metrics)).initialize();
  await dataSource.query(
    'WITH RECURSIVE n(i) AS (SELECT 1 UNION ALL SELECT i + 1 FROM n WHERE i < 3000000) SELECT sum(i), ? FROM n',
    ['typed by somebody'],
  );
  await dataSource.query('SELECT 1');
  await dataSource.destroy();
  const told = lines.filter((line) => line.includes('RECURSIVE'));
  expect(told).toHaveLength(1);
  expect(told[0]).toContain('a slow statement');
  expect(told[0]).not.toContain('typed by somebody');
  expect((await metrics.text()).body).toContain(`bidewell_slow_queries_total ${lines.length}`);
});
