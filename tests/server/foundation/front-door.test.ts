import { afterEach, describe, expect, it } from 'vitest';
import { demoWorkshopId } from '@/server/demo/demo-workshop';
import { Person } from '@/server/entities/person';
import { Workshop } from '@/server/entities/workshop';
import { roles } from '@/shared/contract/roles';
import packageJson from '@/package.json';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let server: TestServer;
afterEach(() => server.close());

/** Moves the own workshop to where the demo's is, with its people. */
async function makeOwnTheDemo() {
  const { manager } = server.deps.dataSource;
  const [own] = await manager.findBy(Workshop, { id: 'workshop-own' });
  await manager.insert(Workshop, { ...own!, id: demoWorkshopId, name: 'Harbour Lane Traction' });
  for (const role of roles) await manager.update(Person, { id: `own-${role}` }, { workshopId: demoWorkshopId });
}

describe('the front door', () => {
  it('of an installation nobody has used offers to create the first workshop', async () => {
    server = await makeTestServer({ empty: true });
    expect((await server.anyone.get('/api/front-door')).body).toEqual({
      demo: false,
      empty: true,
      workshopName: null,
      version: packageJson.version,
    });
  });

  it('names no workshop where there are several', async () => {
    server = await makeTestServer();
    expect((await server.anyone.get('/api/front-door')).body).toMatchObject({
      demo: false,
      empty: false,
      workshopName: null,
    });
  });
});

describe('the demo', () => {
  it('off: sign-in by one tap is not there at all', async () => {
    server = await makeTestServer({ demo: false });
    await makeOwnTheDemo();
    const answer = await server.anyone.post('/api/demo/sign-in', { role: 'manager' });
    expect(answer.status).toBe(404);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });

  it.each(roles)('on: signs in as %s, into the demo workshop and no other', async (role) => {
    server = await makeTestServer({ demo: true });
    expect((await server.anyone.post('/api/demo/sign-in', { role })).status).toBe(404);
    await makeOwnTheDemo();
    expect((await server.anyone.get('/api/front-door')).body).toMatchObject({
      demo: true,
      workshopName: 'Harbour Lane Traction',
    });
    const answer = await server.anyone.post('/api/demo/sign-in', { role });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({ person: { role }, workshop: { id: demoWorkshopId } });
  });
});
