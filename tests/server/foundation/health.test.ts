import { afterEach, expect, it } from 'vitest';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let server: TestServer;
afterEach(() => server.close());

it('says alive always, ready only between start and stop', async () => {
  server = await makeTestServer();
  expect((await server.anyone.get('/healthz')).status).toBe(200);
  expect((await server.anyone.get('/readyz')).body).toEqual({ status: 'ready' });
  server.deps.lifecycle.ready = false;
  const stopping = await server.anyone.get('/readyz');
  expect(stopping.status).toBe(503);
  expect(stopping.body).toEqual({ status: 'starting-or-stopping' });
  expect((await server.anyone.get('/healthz')).status).toBe(200);
});

it('is not ready while a migration is missing', async () => {
  server = await makeTestServer();
  await server.deps.dataSource.query('DELETE FROM migrations');
  expect((await server.anyone.get('/readyz')).body).toEqual({ status: 'migrations-missing' });
});

it('answers an unknown address of the API with a problem', async () => {
  server = await makeTestServer();
  const answer = await server.anyone.get('/api/nothing');
  expect(answer.status).toBe(404);
  expect(answer.type).toBe('application/problem+json');
  expect(answer.body).toMatchObject({ status: 404, code: 'not_found', requestId: answer.headers['x-request-id'] });
});
