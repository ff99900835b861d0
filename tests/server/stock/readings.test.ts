import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SpareDto, SpareHistoryDto } from '@/shared/contract/spare';
import { readingForm, spareForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let technician: TestAgent;
let foreman: TestAgent;
let stocked: Stocked;

beforeAll(async () => {
  server = await makeTestServer();
  technician = server.agentFor('technician');
  foreman = server.agentFor('foreman');
  stocked = await stock(server.agentFor('manager'));
});
afterAll(() => server.close());

const newSpare = (label: string): Promise<SpareDto> =>
  created<SpareDto>(technician, '/api/spares', { ...spareForm(stocked.type.id, { label }), reading: readingForm() });

describe('readings of a spare', () => {
  it('stay in its history, newest first, each with who read it; the newest counts', async () => {
    const spare = await newSpare('S-30');
    server.clock.advance(3_600_000);
    const answer = await technician
      .post(`/api/spares/${spare.id}/readings`, readingForm({ groupVolts: ['3,598', '3.597 V'], note: 'after a week' }))
      .expect(201);
    expect(answer.body.reading).toMatchObject({ groupVolts: [3.598, 3.597], by: { name: 'Technician of own' } });
    const late = { groupVolts: ['3.605', '3.604'], at: '2026-06-09T08:10:00Z' };
    await technician.post(`/api/spares/${spare.id}/readings`, readingForm(late)).expect(201);
    const history = (await technician.get(`/api/spares/${spare.id}/history`).expect(200)).body as SpareHistoryDto;
    expect(history.readings.map(({ groupVolts }) => groupVolts[0])).toEqual([3.598, 3.605, 3.612]);
    expect(history.readings[0]).toMatchObject({ note: 'after a week' });
    expect((await technician.get(`/api/spares/${spare.id}`)).body.reading.groupVolts).toEqual([3.598, 3.597]);
    const [listed] = (await technician.get('/api/spares?q=S-30')).body as SpareDto[];
    expect(listed?.reading?.groupVolts).toEqual([3.598, 3.597]);
  });

  it('under the floor are kept: the plan refuses, the reading is true', async () => {
    const spare = await newSpare('S-31');
    server.clock.advance(60_000);
    const answer = await technician
      .post(`/api/spares/${spare.id}/readings`, readingForm({ groupVolts: ['2.41', '2.894'] }))
      .expect(201);
    expect(answer.body.reading.groupVolts).toEqual([2.41, 2.894]);
  });

  it('of another count, with an unknown meter or of tomorrow say so at their fields', async () => {
    const path = `/api/spares/${stocked.spare.id}/readings`;
    const count = await technician.post(path, readingForm({ groupVolts: ['3.6'] })).expect(400);
    expect(count.body.fields).toEqual({ groupVolts: 'This type has 2 groups; 1 voltage was typed.' });
    const others = await technician
      .post(path, readingForm({ meterId: 'no-such-meter', at: '2026-06-10T08:00:00Z' }))
      .expect(400);
    expect(others.body.fields).toEqual({
      meterId: 'This meter is not on the list. Choose another.',
      at: 'This time is still to come. Type when it was read.',
    });
  });
});

describe('quarantine', () => {
  it('sets a spare aside with reason, time and name, and a technician may do it but not undo it', async () => {
    const spare = await newSpare('S-32');
    const path = `/api/spares/${spare.id}`;
    const aside = await technician
      .post(`${path}/quarantine`, { reason: ' dented at the corner ' })
      .set('If-Match', '"1"')
      .expect(200);
    expect(aside.body).toMatchObject({
      where: 'quarantine',
      quarantine: { reason: 'dented at the corner', by: { name: 'Technician of own' } },
      rev: 2,
    });
    expect(server.hub.told.at(-1)).toMatchObject({ workshopId: server.own.id, event: 'stock:changed' });
    await technician.post(`${path}/release`).set('If-Match', '"2"').expect(403);
    expect((await technician.get('/api/spares?where=quarantine')).body).toHaveLength(1);
    const again = await technician.post(`${path}/quarantine`, { reason: 'swollen' }).set('If-Match', '"1"').expect(409);
    expect(again.body.detail).toBe('S-32 is in quarantine already: dented at the corner');
    expect((await foreman.post(`${path}/release`).set('If-Match', '"2"').expect(200)).body).toMatchObject({
      where: 'shelf',
      quarantine: null,
    });
    await foreman.post(`${path}/release`).set('If-Match', '"3"').expect(409);
  });

  it('is released only as it was seen: what was set aside anew for another reason stays aside', async () => {
    const path = `/api/spares/${(await newSpare('S-33')).id}`;
    const at = (rev: number) => ({ 'If-Match': `"${rev}"` });
    await technician.post(`${path}/quarantine`, { reason: 'label missing' }).set(at(1)).expect(200);
    await foreman.post(`${path}/release`).set(at(2)).expect(200);
    await technician.post(`${path}/quarantine`, { reason: 'swollen' }).set(at(3)).expect(200);
    const late = await foreman.post(`${path}/release`).set(at(2)).expect(412);
    expect(late.body.present).toMatchObject({ where: 'quarantine', quarantine: { reason: 'swollen' }, rev: 4 });
    await foreman.post(`${path}/release`).expect(428);
  });

  it('asks for a reason', async () => {
    const answer = await technician
      .post(`/api/spares/${stocked.spare.id}/quarantine`, { reason: '  ' })
      .set('If-Match', '"1"')
      .expect(400);
    expect(answer.body.fields).toEqual({ reason: 'The reason is missing.' });
  });
});
