import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { MeterDto, ResistorDto } from '@/shared/contract/equipment';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let manager: TestAgent;
let other: TestAgent;
let stocked: Stocked;

const meter = (change: object = {}) => ({ name: 'Bench meter', offsetMillivolts: '−2 mV', checkedAt: '', ...change });
const resistor = (change: object = {}) => ({ name: 'Load 1', ohm: '0,5 Ω', maxWatts: '50 W', ...change });

beforeAll(async () => {
  server = await makeTestServer();
  manager = server.agentFor('manager');
  other = server.agentFor('manager', server.other);
  stocked = await stock(manager);
});
afterAll(() => server.close());

describe('meters', () => {
  it('keep their offset in mV with its sign and the day of the cross-check', async () => {
    const made = await created<MeterDto>(manager, '/api/meters', meter());
    expect(made).toMatchObject({ offsetMillivolts: -2, checkedAt: null, rev: 1 });
    const changed = await manager
      .patch(`/api/meters/${made.id}`, meter({ checkedAt: '2026-06-01T00:00:00+02:00' }))
      .set('If-Match', '1')
      .expect(200);
    expect(changed.body).toMatchObject({ checkedAt: '2026-05-31T22:00:00.000Z', rev: 2 });
    await manager.patch(`/api/meters/${made.id}`, meter()).set('If-Match', '1').expect(412);
  });

  it('refuse a cross-check still to come', async () => {
    const answer = await manager
      .post('/api/meters', meter({ name: 'M', checkedAt: '2026-06-20T08:00:00Z' }))
      .expect(400);
    expect(answer.body.fields).toEqual({
      checkedAt: 'This day is still to come. Type the day of the last cross-check.',
    });
  });

  it('refuse a name that is taken', async () => {
    const answer = await manager.post('/api/meters', meter({ name: 'Hand meter 1' })).expect(409);
    expect(answer.body.fields).toEqual({
      name: 'There is a meter called Hand meter 1 already. Choose another name.',
    });
  });

  it('that readings or a charger name are not removed', async () => {
    const answer = await manager.delete(`/api/meters/${stocked.meter.id}`).set('If-Match', '"1"').expect(409);
    expect(answer.body.detail).toBe('Readings were taken with Hand meter 1. A meter in use cannot be removed.');
    const unused = await created<MeterDto>(manager, '/api/meters', meter({ name: 'Unused' }));
    await manager.delete(`/api/meters/${unused.id}`).set('If-Match', '"1"').expect(204);
  });

  it('of another workshop are unknown: 404', async () => {
    await other.patch(`/api/meters/${stocked.meter.id}`, meter()).set('If-Match', '1').expect(404);
    await other.delete(`/api/meters/${stocked.meter.id}`).set('If-Match', '"1"').expect(404);
    expect((await other.get('/api/meters')).body).toEqual([]);
  });
});

describe('levelling resistors', () => {
  it('are added, changed, listed by name and removed', async () => {
    const made = await created<ResistorDto>(manager, '/api/resistors', resistor());
    expect(made).toMatchObject({ ohm: 0.5, maxWatts: 50 });
    await manager
      .patch(`/api/resistors/${made.id}`, resistor({ maxWatts: '100' }))
      .set('If-Match', '1')
      .expect(200);
    await manager.patch(`/api/resistors/${made.id}`, resistor()).set('If-Match', '1').expect(412);
    expect((await server.agentFor('foreman').get('/api/resistors')).body).toMatchObject([
      { name: 'Load 1', maxWatts: 100 },
    ]);
    await other.delete(`/api/resistors/${made.id}`).set('If-Match', '"1"').expect(404);
    await other.patch(`/api/resistors/${made.id}`, resistor()).set('If-Match', '2').expect(404);
    // Removed as it was seen: somebody has changed it since.
    const late = await manager.delete(`/api/resistors/${made.id}`).set('If-Match', '"1"').expect(412);
    expect(late.body.present).toMatchObject({ maxWatts: 100, rev: 2 });
    await manager.delete(`/api/resistors/${made.id}`).expect(428);
    await manager.delete(`/api/resistors/${made.id}`).set('If-Match', '"2"').expect(204);
    expect((await manager.get('/api/resistors')).body).toEqual([]);
  });

  it('of 0 Ω are refused with the sentence', async () => {
    const answer = await manager.post('/api/resistors', resistor({ ohm: '0' })).expect(400);
    expect(answer.body.fields).toEqual({ ohm: '0\u00a0Ω is too little. Resistance is more than 0\u00a0Ω.' });
  });
});
