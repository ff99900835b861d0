import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import { moduleTypeForm, readingForm, spareForm } from '../../support/forms';
import { makeTestServer, type TestAgent, type TestServer } from '../../support/server';
import { created, stock, type Stocked } from '../../support/stocked';

let server: TestServer;
let technician: TestAgent;
let other: TestAgent;
let stocked: Stocked;
let flat: ModuleTypeDto;

const newSpare = (change: object = {}, reading: object = {}) => ({
  ...spareForm(stocked.type.id, change),
  reading: readingForm(reading),
});

beforeAll(async () => {
  server = await makeTestServer();
  technician = server.agentFor('technician');
  other = server.agentFor('manager', server.other);
  stocked = await stock(server.agentFor('manager'));
  flat = await created(
    server.agentFor('manager'),
    '/api/module-types',
    moduleTypeForm({ name: '4-series 105 Ah', groupsInSeries: '4', ratedAh: '105' }),
  );
});
afterAll(() => server.close());

describe('spares', () => {
  it('come in with their first reading, typed with comma and unit', () => {
    expect(stocked.spare).toMatchObject({
      label: 'S-0417',
      where: 'shelf',
      typeName: '2-series 66 Ah',
      groupsInSeries: 2,
      floorVolts: 2.5,
      usedCapacityAh: 60.4,
      charge: null,
      quarantine: null,
      reading: { groupVolts: [3.612, 3.606], celsius: 21, by: { name: 'Manager of own' } },
    });
    // A measured capacity is known to a few per cent.
    expect(stocked.spare.capacitySdAh / 60.4).toBeGreaterThan(0.01);
    expect(stocked.spare.capacitySdAh / 60.4).toBeLessThan(0.05);
  });

  it('without a measured capacity count rated times health, without either a guess of 92 %', async () => {
    const label = await created<SpareDto>(
      technician,
      '/api/spares',
      newSpare({ label: 'S-1', capacityAh: '', healthPercent: '90 %', capacitySource: 'label' }),
    );
    expect(label.usedCapacityAh).toBeCloseTo(59.4, 6);
    const guessed = await created<SpareDto>(
      technician,
      '/api/spares',
      newSpare({ label: 'S-2', capacityAh: '', capacitySource: 'label' }),
    );
    expect(guessed.usedCapacityAh).toBeCloseTo(60.72, 6);
    // A guess is doubted more than a label, a label more than a measurement.
    const doubt = ({ capacitySdAh, usedCapacityAh }: SpareDto): number => capacitySdAh / usedCapacityAh;
    expect(doubt(guessed)).toBeGreaterThan(doubt(label));
    expect(doubt(label)).toBeGreaterThan(doubt(stocked.spare));
  });

  it('said to be measured need the measured number', async () => {
    const answer = await technician.post('/api/spares', newSpare({ label: 'S-3', capacityAh: '' })).expect(400);
    expect(answer.body.fields).toEqual({
      capacityAh: 'Type what was measured, in Ah or as health. Else choose label or guessed.',
    });
  });

  it('with a label that is taken are refused with 409 at the field, and nothing is kept', async () => {
    const before = (await technician.get('/api/spares')).body.length;
    const answer = await technician.post('/api/spares', newSpare()).expect(409);
    expect(answer.body.fields).toEqual({
      label: 'There is a spare labelled S-0417 already. Each spare has its own label.',
    });
    expect((await technician.get('/api/spares')).body).toHaveLength(before);
  });

  it.each<[string, unknown[], Record<string, string>]>([
    [
      '39.68 V',
      ['3.612', '39.68 V'],
      { 'reading.groupVolts.1': "39.68\u00a0V is over this type's 4.20\u00a0V. A point in the wrong place?" },
    ],
    [
      '3968',
      ['3968', '3.606'],
      {
        'reading.groupVolts.0': "3968\u00a0V is over this type's 4.20\u00a0V. In millivolts? Then it is 3.968\u00a0V.",
      },
    ],
    [
      '4 voltages for 2 groups',
      ['3.6', '3.6', '3.6', '3.6'],
      { 'reading.groupVolts': 'This type has 2 groups; 4 voltages were typed.' },
    ],
    ['an empty field', ['3.6', ''], { 'reading.groupVolts.1': 'The voltage is missing. Type it in V.' }],
    ['letters', ['abc', '3.6'], { 'reading.groupVolts.0': '“abc” is no number. Type it like 3.968.' }],
  ])('with %s are refused at the field', async (_what, groupVolts, fields) => {
    const answer = await technician.post('/api/spares', newSpare({ label: 'S-9' }, { groupVolts })).expect(400);
    expect(answer.body.fields).toEqual(fields);
  });

  it('are found by label, type and shelf place, and listed by where they are', async () => {
    const labels = async (query: string): Promise<string[]> =>
      ((await technician.get(`/api/spares?${query}`).expect(200)).body as SpareDto[]).map(({ label }) => label);
    await created(technician, '/api/spares', {
      ...spareForm(flat.id, { label: 'F-0001', shelfPlace: 'H1', capacityAh: '99' }),
      reading: readingForm({ groupVolts: ['3.3', '3.3', '3.3', '3.3'] }),
    });
    expect(await labels('q=f-00')).toEqual(['F-0001']);
    expect(await labels('q=105')).toEqual(['F-0001']);
    expect(await labels('q=h1')).toEqual(['F-0001']);
    expect(await labels(`moduleTypeId=${flat.id}`)).toEqual(['F-0001']);
    expect(await labels('where=quarantine')).toEqual([]);
    expect(await labels('where=shelf')).toContain('S-0417');
    const answer = await technician.get('/api/spares?where=attic').expect(400);
    expect(answer.body.fields).toHaveProperty('where');
  });

  it('change with the revision that was read; a stale one gets 412 and the present state', async () => {
    const spare = await created<SpareDto>(technician, '/api/spares', newSpare({ label: 'S-10' }));
    const path = `/api/spares/${spare.id}`;
    const change = spareForm(stocked.type.id, { label: 'S-10', shelfPlace: 'rack 2' });
    expect((await technician.patch(path, change).set('If-Match', '"1"').expect(200)).body).toMatchObject({
      shelfPlace: 'rack 2',
      rev: 2,
    });
    const stale = await technician.patch(path, change).set('If-Match', '"1"').expect(412);
    expect(stale.body.present).toMatchObject({ shelfPlace: 'rack 2', rev: 2 });
    await technician.patch(path, change).expect(428);
  });

  it('keep a type with as many groups as their readings have', async () => {
    const answer = await technician
      .patch(`/api/spares/${stocked.spare.id}`, spareForm(flat.id))
      .set('If-Match', '"1"')
      .expect(400);
    expect(answer.body.fields).toEqual({
      moduleTypeId: 'The readings of S-0417 have 2 groups, 4-series 105 Ah has 4. Choose another type.',
    });
  });

  it('of another workshop are unknown: 404 for every route, and in no list', async () => {
    const path = `/api/spares/${stocked.spare.id}`;
    const answers = [
      await other.get(path),
      await other.get(`${path}/history`),
      await other.patch(path, spareForm(stocked.type.id)).set('If-Match', '"1"'),
      await other.post(`${path}/readings`, readingForm()),
      await other.post(`${path}/quarantine`, { reason: 'none of theirs' }).set('If-Match', '"1"'),
      await other.post(`${path}/release`).set('If-Match', '"1"'),
    ];
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404, 404, 404]);
    expect((await other.get('/api/spares')).body).toEqual([]);
    // Its type is unknown there too, and so no field of theirs.
    const taken = await other.post('/api/spares', newSpare({ label: 'S-20' })).expect(400);
    expect(taken.body.fields).toEqual({ moduleTypeId: 'This module type is not on the list. Choose another.' });
  });
});
