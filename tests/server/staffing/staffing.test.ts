import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { staffingForm } from '@/tests/support/benched';
import { makeTestServer, type TestServer } from '@/tests/support/server';
import { makeCrew, refused, taken, type Crew } from '../work/crew';

let server: TestServer;
let crew: Crew;
beforeEach(async () => {
  server = await makeTestServer();
  crew = makeCrew(server);
});
afterEach(() => server.close());

const change = (body: object, rev: number, personId = 'own-technician') =>
  server.agentFor('manager').patch(`/api/staffing/${personId}`, staffingForm(body)).set('If-Match', `"${rev}"`);

describe('hours of people', () => {
  test('are the workshop’s, at revision 0, until somebody has their own', async () => {
    const before = (await crew.staffing()).people;
    expect(before.map(({ person }) => person.id)).toEqual(['own-foreman', 'own-manager', 'own-technician']);
    expect(before.every(({ hours, rev, hoursNow }) => hours === null && rev === 0 && hoursNow.length === 7)).toBe(true);
    const late = { from: '12:00', to: '20:00' };
    const hours = [late, late, late, null, null, null, null];
    const breaks = [{ from: '15:00', to: '15:30' }];
    const daysOff = [{ from: '2026-07-01', to: '2026-07-14', note: 'Away' }];
    const own = (await change({ hours, breaks, daysOff }, 0).expect(200)).body;
    expect(own).toMatchObject({ hours, hoursNow: hours, breaks, daysOff, rev: 1 });
    expect((await crew.staffing()).people[2]).toEqual(own);
    expect(server.hub.of('bench:changed')).toHaveLength(1);
  });

  test('change with their revision only: 412 with what stands there, of the first row too', async () => {
    await change({ breaks: [{ from: '12:00', to: '12:30' }] }, 0).expect(200);
    const again = await change({}, 0);
    expect([again.status, again.body.present.breaks]).toEqual([412, [{ from: '12:00', to: '12:30' }]]);
    expect((await change({}, 1).expect(200)).body.rev).toBe(2);
    expect((await change({}, 3)).status).toBe(412);
  });

  test('refuse a break and a day off that end before they begin, and a skill that is not on the list', async () => {
    const [, , fields] = await refused(
      change({ breaks: [{ from: '13:00', to: '12:00' }], daysOff: [{ from: '2026-07-02', to: '2026-07-01' }] }, 0),
    );
    expect(fields).toEqual({
      'breaks.0.to': 'The break ends before it begins.',
      'daysOff.0.to': 'The last day comes before the first.',
    });
    const skill = await crew.skill('Brakes');
    expect(await refused(change({ skillIds: [skill.id, 'nobodys'] }, 0))).toEqual([
      400,
      'invalid',
      { 'skillIds.1': 'This skill is not on the list. Choose another.' },
    ]);
  });

  test('of somebody switched off are not there any more', async () => {
    await server.agentFor('manager').patch('/api/people/own-technician', { disabled: true }).set('If-Match', '"1"');
    expect((await crew.staffing()).people.map(({ person }) => person.id)).toEqual(['own-foreman', 'own-manager']);
    expect((await change({}, 0)).status).toBe(404);
  });
});

const remove = (what: string, { id, rev }: { id: string; rev: number }) =>
  server.agentFor('manager').delete(`/api/${what}/${id}`).set('If-Match', `"${rev}"`);

describe.each([
  ['skills', 'skillId', 'a skill'],
  ['places', 'placeId', 'a place'],
] as const)('the list of %s', (what, field, called) => {
  const kind = what === 'places' ? { kind: 'bay' } : {};
  const add = (name: string) => taken<{ id: string; rev: number }>(crew.send(what, { name, ...kind }, 'manager'));
  const names = async () => (await crew.staffing())[what].map(({ name }) => name);

  test('is in the order of names, each name once', async () => {
    await add('Two');
    const one = await add('One');
    expect(await names()).toEqual(['One', 'Two']);
    const sentence = `There is ${called} called Two already. Choose another name.`;
    expect(await refused(crew.send(what, { name: ' Two ', ...kind }, 'manager'))).toEqual([
      409,
      'name_taken',
      { name: sentence },
    ]);
    const rename = (name: string, rev: number) =>
      server
        .agentFor('manager')
        .patch(`/api/${what}/${one.id}`, { name, ...kind })
        .set('If-Match', `"${rev}"`);
    expect((await rename('Two', 1)).body.fields).toEqual({ name: sentence });
    expect((await rename('Three', 1).expect(200)).body).toMatchObject({ name: 'Three', rev: 2, inUse: false });
    expect((await rename('Four', 1)).status).toBe(412);
    expect(await names()).toEqual(['Three', 'Two']);
  });

  test('keeps what open work needs: 409 says which work', async () => {
    const row = await add('Bay lift');
    for (let count = 0; count < 2; count += 1) await crew.add({ [field]: row.id });
    expect((await crew.staffing())[what][0]!.inUse).toBe(true);
    expect(await refused(remove(what, row))).toEqual([
      409,
      `${what.slice(0, -1)}_in_use`,
      'W-0001 and W-0002 need Bay lift. Change them first, or drop them.',
    ]);
    for (let count = 0; count < 3; count += 1) await crew.add({ [field]: row.id });
    expect((await refused(remove(what, row)))[2]).toBe(
      'W-0001, W-0002, W-0003 and 2 more need Bay lift. Change them first, or drop them.',
    );
    expect(await names()).toEqual(['Bay lift']);
  });

  test('lets go what only work that is over has named: that work keeps the name, and the name is free again', async () => {
    const row = await add('Bay lift');
    const work = await crew.add({ [field]: row.id });
    await taken(crew.send(`work/${work.id}/drop`, { reason: 'Sold.' }));
    await remove(what, row).expect(204);
    expect(await names()).toEqual([]);
    expect((await crew.seen(work.id))[field === 'skillId' ? 'skill' : 'place']?.name).toBe('Bay lift');
    expect((await remove(what, row)).status).toBe(404);
    const fields = (await refused(crew.send('work', { ...openForm, [field]: row.id })))[2];
    expect(fields).toHaveProperty(field);
    // Another one of the same name is another row.
    const again = await add('Bay lift');
    expect(again.id).not.toBe(row.id);
    // Brought back, the work needs it no longer: it is not on the list.
    const back = await taken(crew.send(`work/${work.id}/reopen`));
    expect([back.state, back.skill, back.place]).toEqual(['open', null, null]);
  });
});

const openForm = {
  ...{ title: 'Tyres', likelyMinutes: 20, longMinutes: null, skillId: null, placeId: null, priority: 'low' },
  ...{ dueAt: null, repairId: null, splittable: false, note: null },
};

test('a skill that is removed is taken from everybody who has it, and their row has a new revision', async () => {
  const [brakes, tyres] = [await crew.skill('Brakes'), await crew.skill('Tyres')];
  await crew.staff('technician', { skillIds: [brakes.id, tyres.id, brakes.id] });
  await crew.staff('foreman', { skillIds: [tyres.id] });
  expect((await crew.staffing()).skills.map(({ name, people }) => [name, people])).toEqual([
    ['Brakes', 1],
    ['Tyres', 2],
  ]);
  await remove('skills', brakes).expect(204);
  const { people } = await crew.staffing();
  expect(people.map(({ skillIds, rev }) => [skillIds, rev])).toEqual([
    [[tyres.id], 1],
    [[], 0],
    [[tyres.id], 2],
  ]);
});
