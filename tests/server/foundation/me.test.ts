import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Person } from '@/server/entities/person';
import { Session } from '@/server/entities/session';
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

  it('a new name counts up the revision, so that a manager’s open form does not put the old one back unseen', async () => {
    await signIn();
    await browser.patch('/api/me', { name: 'Ines M.' });
    const person = `/api/people/${server.own.people.technician.id}`;
    const form = { name: server.own.people.technician.name, role: 'foreman' };
    const late = await server.agentFor('manager').patch(person, form).set('If-Match', '"1"');
    expect(late.status).toBe(412);
    expect(late.body.present).toMatchObject({ name: 'Ines M.', role: 'technician', rev: 2 });
  });

  /** Somebody sets another password while this one is still being compared. */
  function otherPasswordMeanwhile() {
    const { passwords, dataSource } = server.deps;
    const compare = passwords.matches;
    passwords.matches = async (password, hash) => {
      const right = await compare(password, hash);
      const { id } = server.own.people.technician;
      await dataSource.manager.update(Person, { id }, { passwordHash: await passwords.hash('another one meanwhile') });
      return right;
    };
  }

  it('a password that was changed while the old one was compared lets nobody in with the old one', async () => {
    otherPasswordMeanwhile();
    const { id } = server.own.people.technician;
    const before = await server.deps.dataSource.manager.countBy(Session, { personId: id });
    expect((await signIn()).status).toBe(401);
    expect(await server.deps.dataSource.manager.countBy(Session, { personId: id })).toBe(before);
  });

  it('a password that was changed meanwhile is not overwritten by who knew only the last one', async () => {
    await signIn();
    otherPasswordMeanwhile();
    const next = { currentPassword: testPassword, password: 'seven lamps over the slipway' };
    const answer = await browser.patch('/api/me', next);
    expect(answer.body.fields).toEqual({ currentPassword: 'This is not your present password any more.' });
    const { id } = server.own.people.technician;
    const { passwordHash } = await server.deps.dataSource.manager.findOneByOrFail(Person, { id });
    expect(passwordHash).toBe(await server.deps.passwords.hash('another one meanwhile'));
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
