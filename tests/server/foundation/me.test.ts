import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Jar } from '@/tests/support/cookies';
import { makeAgent, makeTestServer, testPassword, type TestAgent, type TestServer } from '@/tests/support/server';

let server: TestServer;
let jar: Jar;
let browser: TestAgent;

beforeEach(async () => {
  server = await makeTestServer();
  jar = new Jar();
  browser = makeAgent(server.app, () => jar.header());
});
afterEach(() => server.close());

const email = () => server.own.people.technician.email;
const signIn = async (password = testPassword) =>
  jar.take(await browser.post('/api/session', { email: email(), password }));

describe('one’s own name and password', () => {
  it('change; a new password ends the other sessions and keeps this one', async () => {
    const elsewhere = new Jar();
    elsewhere.take(await server.anyone.post('/api/session', { email: email(), password: testPassword }));
    await signIn();
    const next = 'seven lamps over the slipway';
    const answer = await browser.patch('/api/me', { name: 'Ines M.', currentPassword: testPassword, password: next });
    expect(answer.status).toBe(204);
    expect((await browser.get('/api/session')).body.person.name).toBe('Ines M.');
    expect((await makeAgent(server.app, () => elsewhere.header()).get('/api/session')).status).toBe(401);
    expect((await signIn(testPassword)).status).toBe(401);
    expect((await signIn(next)).status).toBe(200);
  });

  it('a new password needs the present one, and a wrong one may be tried 10 times', async () => {
    await signIn();
    const password = 'seven lamps over the slipway';
    const without = await browser.patch('/api/me', { password });
    expect(without.body.fields).toEqual({ currentPassword: 'Type your present password too.' });
    for (let i = 0; i < 10; i += 1) {
      const wrong = await browser.patch('/api/me', { password, currentPassword: 'guess' });
      expect(wrong.body.fields).toEqual({ currentPassword: 'This is not your present password.' });
    }
    expect((await browser.patch('/api/me', { password, currentPassword: testPassword })).status).toBe(429);
  });
});
