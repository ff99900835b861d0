import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { moduleTypeForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let manager: TestAgent;
let other: TestAgent;
let stocked: Stocked;

beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  other = server.agentFor('manager', server.other);
  stocked = await stock(manager);
});
afterAll(() => server.close());

describe('module types', () => {
  it('are added as they are typed and announced to the workshop', async () => {
    const told = server.hub.of('equipment:changed').length;
    const type = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm({ name: '3-series 78 Ah' }));
    expect(type).toMatchObject({ name: '3-series 78 Ah', ratedAh: 66, shelfVolts: 3.6, spareCount: 0, rev: 1 });
    expect(server.hub.of('equipment:changed')).toHaveLength(told + 1);
    expect(server.hub.told.at(-1)).toMatchObject({ workshopId: server.own.id });
  });

  it('count their spares, and are read by a technician', async () => {
    const answer = await server.agentFor('technician').get('/api/module-types').expect(200);
    const types = answer.body as ModuleTypeDto[];
    expect(types.find(({ id }) => id === stocked.type.id)).toMatchObject({ spareCount: 1, chargeCount: 0 });
  });

  it('are not changed by a technician or a foreman', async () => {
    for (const role of ['technician', 'foreman'] as const)
      await server
        .agentFor(role)
        .post('/api/module-types', moduleTypeForm({ name: 'x' }))
        .expect(403);
  });

  it('say each wrong field in one answer and keep nothing', async () => {
    const answer = await manager
      .post(
        '/api/module-types',
        moduleTypeForm({ name: 'Wrong', ratedAh: '0 Ah', maxChargeAmps: '-5 A', chemistry: 'x' }),
      )
      .expect(400);
    expect(answer.body).toMatchObject({
      code: 'invalid',
      fields: {
        ratedAh: '0\u00a0Ah is too little. Rated capacity is more than 0\u00a0Ah.',
        maxChargeAmps: '−5\u00a0A is too little. Current is more than 0\u00a0A.',
        chemistry: 'Choose one of: nmc, lmo-blend, lfp, lto, nimh.',
      },
    });
    const types = (await manager.get('/api/module-types')).body as ModuleTypeDto[];
    expect(types.map(({ name }) => name)).not.toContain('Wrong');
  });

  it('refuse a name that is taken with 409 and its sentence at the field', async () => {
    const answer = await manager.post('/api/module-types', moduleTypeForm()).expect(409);
    expect(answer.body.fields).toEqual({
      name: 'There is a type called 2-series 66 Ah already. Choose another name.',
    });
  });

  it('may be called the same in another workshop', async () => {
    await created(other, '/api/module-types', moduleTypeForm());
  });

  it('change with the revision that was read, and answer a stale one with 412 and the present state', async () => {
    const path = `/api/module-types/${stocked.type.id}`;
    const changed = await manager
      .patch(path, moduleTypeForm({ shelfVolts: '3,88' }))
      .set('If-Match', '"1"')
      .expect(200);
    expect(changed.body).toMatchObject({ shelfVolts: 3.88, rev: 2 });
    const stale = await manager
      .patch(path, moduleTypeForm({ shelfVolts: '3.5' }))
      .set('If-Match', '"1"')
      .expect(412);
    expect(stale.body.present).toMatchObject({ shelfVolts: 3.88, rev: 2 });
    await manager.patch(path, moduleTypeForm()).expect(428);
    expect((await manager.get(path)).body).toMatchObject({ shelfVolts: 3.88 });
  });

  it('keep their number of groups while spares are of them', async () => {
    const { rev } = (await manager.get(`/api/module-types/${stocked.type.id}`)).body as ModuleTypeDto;
    const answer = await manager
      .patch(`/api/module-types/${stocked.type.id}`, moduleTypeForm({ groupsInSeries: '3' }))
      .set('If-Match', `"${rev}"`)
      .expect(400);
    expect(answer.body.fields).toEqual({
      groupsInSeries: 'The readings of this type’s spares have 2 groups. Add a new type for another number.',
    });
  });

  it('in use are not removed, and the sentence counts why', async () => {
    const path = `/api/module-types/${stocked.type.id}`;
    const { rev } = (await manager.get(path).expect(200)).body as ModuleTypeDto;
    const answer = await manager.delete(path).set('If-Match', `"${rev}"`).expect(409);
    expect(answer.body).toMatchObject({
      code: 'type_in_use',
      detail: '2-series 66 Ah has 1 spare and 0 charges. A type in use cannot be removed.',
    });
  });

  it('not in use are removed', async () => {
    const type = await created<ModuleTypeDto>(manager, '/api/module-types', moduleTypeForm({ name: 'Gone' }));
    await manager.delete(`/api/module-types/${type.id}`).set('If-Match', '"1"').expect(204);
    await manager.get(`/api/module-types/${type.id}`).expect(404);
  });

  it('of another workshop are unknown: 404 for reading, changing and removing', async () => {
    const path = `/api/module-types/${stocked.type.id}`;
    const nowhere = (await other.get('/api/module-types/no-such-type')).body.detail as string;
    const answers = [
      await other.get(path),
      await other.patch(path, moduleTypeForm()).set('If-Match', '"1"'),
      await other.delete(path).set('If-Match', '"1"'),
    ];
    for (const answer of answers) {
      expect(answer.status).toBe(404);
      expect(answer.body.detail).toBe(nowhere);
    }
  });
});
