import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { RepairListDto, RepairPageDto } from '@/shared/contract/repair';
import { hour, makeBench, minute, type Bench } from '../charges/bench';
import { arrival, makeShop, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
let page: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  page = await shop.book();
});
afterEach(() => bench.server.close());

const post = (what: string, body: object = {}, role: 'technician' | 'manager' = 'technician') =>
  shop.send(`repairs/${page.id}/${what}`, body, role);
const numbersIn = async (state: string): Promise<string[]> =>
  ((await bench.as('technician').get(`/api/repairs?state=${state}`)).body as RepairListDto).repairs.map(
    (one) => one.number,
  );

describe('the hand-over', () => {
  test('names what is missing, and goes without where the note says why', async () => {
    page = await shop.confirm(await shop.read(page.id, arrival));
    const refused = await post('hand-over', { note: '' });
    expect([refused.status, refused.body.code]).toEqual([409, 'steps_missing']);
    expect(refused.body.detail).toBe(
      'Not done yet: target, spare, charge, fit and prove. Do them, or say in the note why it is handed over without.',
    );
    page = await taken(post('hand-over', { note: 'The customer sells it as it is.' }));
    expect(page).toMatchObject({ state: 'handed-over', handedOver: { note: 'The customer sells it as it is.' } });
    expect(page.events[0]!.text).toBe(
      'handed over without target, spare, charge, fit and prove: The customer sells it as it is',
    );
    const after = await post('readings', {
      stage: 'arrival',
      balanceCount: null,
      groupVolts: arrival,
      packVolts: '',
      celsius: '',
      restedMinutes: '',
      meterId: null,
      instrument: '',
      source: 'typed',
      fileName: '',
      note: '',
    });
    expect([after.status, after.body.detail]).toEqual([
      409,
      'R-1 is handed over. Book a new repair for what comes now.',
    ]);
  });

  test('frees the spare that was reserved, and ends the wait', async () => {
    const spareId = await bench.spare('S-0417');
    page = await shop.take(await shop.read(page.id, arrival));
    page = await taken(post('spare', { spareId }));
    page = await taken(post('hand-over', { note: 'Another day.' }));
    expect([page.waits, page.wait.length]).toEqual([false, 1]);
    const next = await shop.book();
    page = await taken(shop.send(`repairs/${next.id}/spare`, { spareId }));
    expect(page.spare).toMatchObject({ id: spareId });
  });
});

describe('the module taken out', () => {
  test('has its fate, and one that goes back in needs what was advised and declined', async () => {
    const refused = await post('removed', { modulePosition: '2', fate: 'went-back-in', note: '' });
    expect([refused.status, refused.body.fields.note]).toEqual([400, 'Say what was advised and why it was declined.']);
    expect((await post('removed', { modulePosition: '7', fate: 'scrap', note: '' })).status).toBe(400);
    page = await taken(post('removed', { modulePosition: '2', fate: 'quarantine', note: 'Slightly swollen' }));
    expect(page.removed).toMatchObject([
      { modulePosition: '2', fate: 'quarantine', by: { name: 'Technician of own' } },
    ]);
    expect(page.events[0]!.text).toBe('module 2 in quarantine: Slightly swollen');
  });
});

describe('archive and deletion', () => {
  test('only what is handed over is archived, and comes out again', async () => {
    expect((await post('archive', { archived: true })).body.detail).toBe('R-1 is open still. Hand it over first.');
    await taken(post('hand-over', { note: 'Closed.' }));
    await taken(post('archive', { archived: true }));
    expect([await numbersIn('archived'), await numbersIn('handed-over')]).toEqual([['R-1'], []]);
    expect((await taken(post('archive', { archived: false }))).state).toBe('handed-over');
  });

  test('a manager deletes with a reason and brings it back; everything of it is still there', async () => {
    page = await shop.read(page.id, arrival);
    expect((await post('delete', { reason: 'Booked twice.' })).status).toBe(403);
    expect((await post('delete', { reason: '' }, 'manager')).status).toBe(400);
    const deleted = await taken(post('delete', { reason: 'Booked twice.' }, 'manager'));
    expect(deleted).toMatchObject({
      state: 'deleted',
      deleted: { reason: 'Booked twice.', by: { name: 'Manager of own' } },
    });
    expect([await numbersIn('open'), await numbersIn('deleted')]).toEqual([[], ['R-1']]);
    expect(
      (await post('target', { readingId: page.readings[0]!.id, volts: null, toleranceMillivolts: 5, reason: null }))
        .status,
    ).toBe(409);
    const back = await taken(post('restore', {}, 'manager'));
    expect(back).toMatchObject({ state: 'open', deleted: null, readings: [{ spreadMillivolts: 99 }] });
    expect((await post('restore', {}, 'manager')).status).toBe(409);
  });

  test('a repair whose charge is open is not deleted; a spare taken meanwhile stays with who has it', async () => {
    const spareId = await bench.spare('S-0417');
    page = await shop.take(await shop.read(page.id, arrival));
    const charge = await shop.plan(page, spareId);
    expect((await post('delete', { reason: 'x' }, 'manager')).body.detail).toBe(
      'S-0417 is on R-1 for it. Drop, stop or fit that charge first.',
    );
    await bench.as('technician').delete(`/api/charges/${charge.id}`).set('If-Match', `"${charge.rev}"`).expect(204);
    const deleted = await taken(post('delete', { reason: 'x' }, 'manager'));
    expect(deleted.waits).toBe(false);
    const other = await shop.book();
    await taken(shop.send(`repairs/${other.id}/spare`, { spareId }));
    const back = await taken(post('restore', {}, 'manager'));
    expect(back.spare).toBeNull();
    expect(back.events[0]!.text).toBe('brought back, without S-0417: R-2 has it');
    expect(back.waits).toBe(true);
  });
});

describe('the wait', () => {
  const correct = (body: object, rev = page.rev) =>
    bench
      .as('technician')
      .patch(`/api/repairs/${page.id}/wait/${page.wait[0]!.id}`, { reason: 'The lid was off earlier', ...body })
      .set('If-Match', `"${rev}"`);

  test('is corrected with a reason and a name; what stood there is in the log', async () => {
    page = await shop.take(await shop.read(page.id, arrival));
    const began = Date.parse(page.wait[0]!.from);
    bench.server.clock.advance(hour);
    const from = new Date(began - 30 * minute).toISOString();
    expect((await correct({ from, to: null }, 1)).status).toBe(412);
    expect((await correct({ from: new Date(began + 9 * hour).toISOString(), to: null })).status).toBe(400);
    expect((await correct({ from, to: from })).status).toBe(409);
    page = (await correct({ from, to: null }).expect(200)).body as RepairPageDto;
    expect(page.wait).toMatchObject([
      { from, to: null, corrected: { reason: 'The lid was off earlier', by: { name: 'Technician of own' } } },
    ]);
    expect(page.events[0]!.text).toBe('corrected the wait 10:00–now to 09:30–now: The lid was off earlier');
  });

  test('that has ended keeps an end, and does not overlap another', async () => {
    page = await shop.take(await shop.read(page.id, arrival));
    bench.server.clock.advance(hour);
    page = await taken(post(`readings/${page.readings[0]!.id}/set-aside`, { reason: 'Read at the wrong plug' }));
    bench.server.clock.advance(hour);
    page = await shop.take(await shop.read(page.id, arrival));
    expect(page.wait).toHaveLength(2);
    const [second, first] = page.wait;
    const overlapping = await bench
      .as('technician')
      .patch(`/api/repairs/${page.id}/wait/${first!.id}`, {
        from: first!.from,
        to: new Date(Date.parse(second!.from) + 1).toISOString(),
        reason: 'x',
      })
      .set('If-Match', `"${page.rev}"`);
    expect(overlapping.status).toBe(400);
    const without = await bench
      .as('technician')
      .patch(`/api/repairs/${page.id}/wait/${first!.id}`, { from: first!.from, to: null, reason: 'x' })
      .set('If-Match', `"${page.rev}"`);
    expect(without.body.fields.to).toBe('This wait has ended. Type when.');
  });
});
