import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Invitation } from '@/server/entities/invitation';
import { Session } from '@/server/entities/session';
import type { Role } from '@/shared/contract/roles';
import { Jar } from '@/tests/support/cookies';
import { makeAgent, makeTestServer, testPassword, type TestServer } from '@/tests/support/server';

let server: TestServer;
const hour = 3600_000;
beforeEach(async () => {
  server = await makeTestServer();
});
afterEach(() => server.close());

const manager = () => server.agentFor('manager');
const newPassword = 'seven lamps over the slipway';
const change = (id: string, body: object, rev = 1) =>
  manager().patch(`/api/people/${id}`, body).set('If-Match', `"${rev}"`);
const tokenOf = (answer: { body: { url: string } }) => new URL(answer.body.url).searchParams.get('token') ?? '';
const invite = (email = 'nell@example.com', role: Role = 'technician') =>
  manager().post('/api/invitations', { email, role });

describe('people', () => {
  it('are listed by name, without their secrets, to every member', async () => {
    const { body } = await server.agentFor('technician').get('/api/people');
    expect(body).toHaveLength(3);
    expect(body[0]).toEqual({
      id: 'own-foreman',
      name: 'Foreman of own',
      email: 'foreman@own.example.com',
      role: 'foreman',
      disabled: false,
      lastSeenAt: null,
      rev: 1,
    });
  });

  it('a new role counts from the next request, and the sockets are told', async () => {
    const technician = server.agentFor('technician');
    expect((await technician.get('/api/walls')).status).toBe(403);
    const answer = await change('own-technician', { role: 'foreman' });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({ role: 'foreman', rev: 2 });
    expect((await technician.get('/api/walls')).status).toBe(200);
    expect(server.hub.of('end')).toEqual([{ personId: 'own-technician', reason: 'role-changed' }]);
    expect(server.hub.of('people:changed')).toHaveLength(1);
  });

  it('a refusal names the role that may', async () => {
    const { body } = await server.agentFor('technician').patch('/api/people/own-foreman', {}).set('If-Match', '"1"');
    expect(body.detail).toBe('This needs the role manager. You are signed in as technician.');
  });

  it('switching somebody off ends their sessions at once; switching them on again does not revive them', async () => {
    const jar = new Jar();
    const { email } = server.own.people.technician;
    jar.take(await server.anyone.post('/api/session', { email, password: testPassword }));
    const theirs = makeAgent(server.app, () => jar.header());
    expect((await change('own-technician', { disabled: true })).body.disabled).toBe(true);
    expect((await theirs.get('/api/session')).status).toBe(401);
    expect((await theirs.post('/api/session/refresh')).status).toBe(401);
    expect(server.hub.of('end')).toEqual([{ personId: 'own-technician', reason: 'disabled' }]);
    expect((await change('own-technician', { disabled: false }, 2)).body.disabled).toBe(false);
    expect((await theirs.get('/api/session')).status).toBe(401);
    expect((await server.anyone.post('/api/session', { email, password: testPassword })).status).toBe(200);
  });

  it('an old revision is told how it stands now', async () => {
    await change('own-technician', { name: 'Ines Marlow' });
    const late = await change('own-technician', { name: 'Another' });
    expect(late.status).toBe(412);
    expect(late.body.present).toMatchObject({ name: 'Ines Marlow', rev: 2 });
  });

  it.each([{ role: 'technician' }, { disabled: true }])('the only manager stays one: %o is refused', async (body) => {
    const answer = await change('own-manager', body);
    expect(answer.status).toBe(409);
    expect(answer.body.code).toBe('last_manager');
    await change('own-foreman', { role: 'manager' });
    expect((await change('own-manager', body)).status).toBe(200);
  });

  it('two managers who demote each other at the same moment leave one', async () => {
    await change('own-foreman', { role: 'manager' });
    const [one, two] = await Promise.all([
      manager().patch('/api/people/own-foreman', { role: 'technician' }).set('If-Match', '"2"'),
      server.agentFor('foreman').patch('/api/people/own-manager', { role: 'technician' }).set('If-Match', '"1"'),
    ]);
    // The second is no manager any more, or would leave none.
    expect([one.status, two.status].sort()).toEqual([200, expect.toBeOneOf([403, 409])]);
    const { body } = await server.agentFor('technician').get('/api/people');
    expect(body.filter((person: { role: Role }) => person.role === 'manager')).toHaveLength(1);
  });
});

describe('an invitation', () => {
  it('is a link shown once, whose token the database does not hold', async () => {
    const answer = await invite();
    expect(answer.status).toBe(201);
    expect(answer.body.url).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/join\?token=[\w-]{43}$/);
    expect(Date.parse(answer.body.expiresAt)).toBe(server.clock.now() + 72 * hour);
    const rows = JSON.stringify(await server.deps.dataSource.query('SELECT * FROM invitation'));
    expect(rows).not.toContain(tokenOf(answer));
    const { body } = await manager().get('/api/invitations');
    expect(body).toEqual([
      expect.objectContaining({
        email: 'nell@example.com',
        role: 'technician',
        lapsed: false,
        invitedBy: 'Manager of own',
      }),
    ]);
  });

  it('says what it is for, and makes a person of the invited role who is signed in', async () => {
    const token = tokenOf(await invite('nell@example.com', 'foreman'));
    expect((await server.anyone.get(`/api/links/${token}`)).body).toEqual({
      kind: 'join',
      workshopName: 'The own workshop',
      email: 'nell@example.com',
      role: 'foreman',
      expiresAt: new Date(server.clock.now() + 72 * hour).toISOString(),
    });
    const jar = new Jar();
    const answer = jar.take(await server.anyone.post('/api/join', { token, name: 'Nell Carr', password: newPassword }));
    expect(answer.status).toBe(201);
    expect(answer.body.person).toMatchObject({ name: 'Nell Carr', role: 'foreman', email: 'nell@example.com' });
    expect((await makeAgent(server.app, () => jar.header()).get('/api/walls')).status).toBe(200);
    expect((await manager().get('/api/invitations')).body).toEqual([]);
  });

  it('works once', async () => {
    const token = tokenOf(await invite());
    const join = (name: string) => server.anyone.post('/api/join', { token, name, password: newPassword });
    const both = await Promise.all([join('Nell One'), join('Nell Two')]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 404]);
    expect((await join('Nell Three')).status).toBe(404);
    expect((await server.anyone.get(`/api/links/${token}`)).body.code).toBe('link_over');
  });

  it('lapses after 72 hours, is recalled, and gives way to a newer one', async () => {
    const lapsing = tokenOf(await invite());
    server.clock.advance(72 * hour - 1);
    expect((await server.anyone.get(`/api/links/${lapsing}`)).status).toBe(200);
    server.clock.advance(1);
    expect((await server.anyone.get(`/api/links/${lapsing}`)).status).toBe(404);
    expect((await manager().get('/api/invitations')).body[0].lapsed).toBe(true);

    const replaced = tokenOf(await invite());
    const newer = tokenOf(await invite());
    expect((await server.anyone.get(`/api/links/${replaced}`)).status).toBe(404);
    const { id } = (await manager().get('/api/invitations')).body[0];
    expect((await manager().delete(`/api/invitations/${id}`)).status).toBe(204);
    expect((await server.anyone.get(`/api/links/${newer}`)).status).toBe(404);
    expect((await manager().delete(`/api/invitations/${id}`)).status).toBe(404);
  });

  it('keeps what was typed worth trying again: a weak password does not use it up', async () => {
    const token = tokenOf(await invite());
    const weak = await server.anyone.post('/api/join', { token, name: 'Nell Carr', password: 'password1234' });
    expect(weak.status).toBe(400);
    expect(weak.body.fields.password).toContain('tried first');
    const own = await server.anyone.post('/api/join', { token, name: 'Nell Carr', password: 'the own workshop' });
    expect(own.body.fields.password).toContain('workshop’s name');
    expect((await server.anyone.post('/api/join', { token, name: 'Nell Carr', password: newPassword })).status).toBe(
      201,
    );
  });

  it('to somebody who is here already is refused; of another workshop’s people it tells nothing', async () => {
    expect((await invite('foreman@own.example.com')).status).toBe(409);
    const elsewhere = await invite('foreman@other.example.com');
    expect(elsewhere.status).toBe(201);
    const taken = await server.anyone.post('/api/join', {
      token: tokenOf(elsewhere),
      name: 'Foreman',
      password: newPassword,
    });
    expect(taken.status).toBe(409);
    expect(taken.body.fields.email).toBeDefined();
    // Refused as a whole: the link can still be used after the other account is gone.
    const [row] = await server.deps.dataSource.manager.find(Invitation);
    expect(row?.usedAt).toBeNull();
  });
});

describe('a reset link', () => {
  it('sets a new password once, and ends every other session', async () => {
    const before = new Jar();
    const { email } = server.own.people.technician;
    before.take(await server.anyone.post('/api/session', { email, password: testPassword }));
    const made = await manager().post('/api/people/own-technician/reset-link');
    expect(made.status).toBe(201);
    const token = tokenOf(made);
    expect((await server.anyone.get(`/api/links/${token}`)).body).toMatchObject({ kind: 'reset', email });
    const after = new Jar();
    const answer = after.take(await server.anyone.post('/api/reset', { token, password: newPassword }));
    expect(answer.status).toBe(200);
    expect((await makeAgent(server.app, () => after.header()).get('/api/session')).status).toBe(200);
    expect((await makeAgent(server.app, () => before.header()).get('/api/session')).status).toBe(401);
    expect((await server.anyone.post('/api/session', { email, password: testPassword })).status).toBe(401);
    expect((await server.anyone.post('/api/session', { email, password: newPassword })).status).toBe(200);
    expect((await server.anyone.post('/api/reset', { token, password: newPassword })).status).toBe(404);
  });

  it('is not an invitation, and an invitation is not a reset', async () => {
    const reset = tokenOf(await manager().post('/api/people/own-technician/reset-link'));
    const join = tokenOf(await invite());
    expect((await server.anyone.post('/api/join', { token: reset, name: 'X', password: newPassword })).status).toBe(
      404,
    );
    expect((await server.anyone.post('/api/reset', { token: join, password: newPassword })).status).toBe(404);
  });

  it('dies with the person’s sign-in, and is not made for one who is switched off', async () => {
    const token = tokenOf(await manager().post('/api/people/own-technician/reset-link'));
    await change('own-technician', { disabled: true });
    expect((await server.anyone.post('/api/reset', { token, password: newPassword })).status).toBe(404);
    expect((await manager().post('/api/people/own-technician/reset-link')).status).toBe(409);
  });
});

describe('a workshop', () => {
  const input = {
    workshopName: 'Quay Street Cells',
    zone: 'Europe/Lisbon',
    name: 'Alva Reis',
    email: 'alva@example.com',
    password: newPassword,
  };

  it('is created with its first manager, who sees nothing of another', async () => {
    const jar = new Jar();
    const answer = jar.take(await server.anyone.post('/api/workshops', input));
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      person: { name: 'Alva Reis', role: 'manager' },
      workshop: { name: 'Quay Street Cells', zone: 'Europe/Lisbon' },
    });
    const agent = makeAgent(server.app, () => jar.header());
    expect((await agent.get('/api/people')).body).toHaveLength(1);
    expect((await agent.get('/api/workshop')).body).toMatchObject({
      name: 'Quay Street Cells',
      toleranceMillivolts: 5,
      minRestMinutes: 60,
      lookInMinutes: 60,
      inrushLimitC: 1,
      rev: 1,
    });
  });

  it('is not created on an address that signs in already, nor with a weak password, nor in no zone', async () => {
    const taken = await server.anyone.post('/api/workshops', { ...input, email: 'Manager@Own.example.com' });
    expect(taken.status).toBe(409);
    expect(taken.body.fields.email).toBeDefined();
    const weak = await server.anyone.post('/api/workshops', { ...input, password: 'QuayStreetCells1' });
    expect(weak.body.fields).toHaveProperty('password');
    const nowhere = await server.anyone.post('/api/workshops', { ...input, zone: 'Mars/Olympus' });
    expect(nowhere.body.fields).toHaveProperty('zone');
    expect(await server.deps.dataSource.manager.countBy(Session, { device: 'Unknown device' })).toBe(0);
  });

  it('more than 5 an hour from one address are refused', async () => {
    for (let i = 0; i < 5; i += 1) await server.anyone.post('/api/workshops', { ...input, email: `a${i}@example.com` });
    const refused = await server.anyone.post('/api/workshops', { ...input, email: 'a6@example.com' });
    expect(refused.status).toBe(429);
  });

  it('changes single settings against its revision', async () => {
    const patch = (body: object, rev: number) => manager().patch('/api/workshop', body).set('If-Match', `"${rev}"`);
    const answer = await patch({ toleranceMillivolts: '4,5 mV' }, 1);
    expect(answer.body).toMatchObject({ toleranceMillivolts: 4.5, minRestMinutes: 60, rev: 2 });
    expect((await manager().get('/api/workshop')).body).toEqual(answer.body);
    const late = await patch({ name: 'Late' }, 1);
    expect(late.status).toBe(412);
    expect(late.body.present).toMatchObject({ rev: 2, toleranceMillivolts: 4.5 });
    const wrong = await patch({ toleranceMillivolts: 0, minRestMinutes: 'soon' }, 2);
    expect(Object.keys(wrong.body.fields).sort()).toEqual(['minRestMinutes', 'toleranceMillivolts']);
    // Columns that are no settings are not for sale.
    await patch({ boardRev: 99, id: 'mine', name: 'The own workshop' }, 2);
    const [row] = await server.deps.dataSource.query("SELECT board_rev FROM workshop WHERE id = 'workshop-own'");
    expect(row.board_rev).toBe(1);
    expect(server.hub.of('workshop:changed')).toHaveLength(2);
  });
});
