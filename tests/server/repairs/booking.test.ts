import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { PackTypeDto } from '@/shared/contract/pack';
import type { RepairListDto, RepairPageDto } from '@/shared/contract/repair';
import { repairForm } from '@/tests/support/repaired';
import { hour, key, makeBench, type Bench } from '../charges/bench';
import { arrival, makeShop, packForm, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
});
afterEach(() => bench.server.close());

const list = async (query = ''): Promise<RepairListDto> =>
  (await bench.as('technician').get(`/api/repairs${query}`).expect(200)).body as RepairListDto;
const numbers = async (query = ''): Promise<string[]> => (await list(query)).repairs.map(({ number }) => number);
const change = (page: RepairPageDto, body: object, rev = page.rev) =>
  bench.as('technician').patch(`/api/repairs/${page.id}`, body).set('If-Match', `"${rev}"`);

describe('the number', () => {
  test('is the one after the highest of the workshop, those that only charges name and deleted ones too', async () => {
    expect((await shop.book()).number).toBe('R-1');
    await shop.plan({ id: null as unknown as string }, await bench.spare('S-0001'), { repairRef: 'R-2430' });
    expect((await shop.book()).number).toBe('R-2431');
    const other = await shop.book({ number: 'Job 9000' });
    expect(other.number).toBe('Job 9000');
    const last = await shop.book();
    expect(last.number).toBe('R-2432');
    await taken(shop.send(`repairs/${last.id}/delete`, { reason: 'Booked twice.' }, 'manager'));
    expect((await shop.book()).number).toBe('R-2433');
  });

  test('that is taken answers 409 at its field; the same key books once', async () => {
    await shop.book({ number: 'R-5' });
    const answer = await shop.send('repairs', repairForm(bench.typeId, { number: 'R-5' }));
    expect([answer.status, answer.body.code]).toEqual([409, 'name_taken']);
    expect(answer.body.fields.number).toBe('There is a repair R-5 already. Type another number, or none.');
    const once = key();
    const book = () =>
      bench.as('technician').post('/api/repairs', repairForm(bench.typeId)).set('Idempotency-Key', once);
    const [first, second] = [await book(), await book()];
    expect([second.status, second.body.id]).toEqual([201, first.body.id]);
    expect((await list()).counts.open).toBe(2);
  });
});

describe('the pack', () => {
  test('has as many groups a module as its module type, and full modules', async () => {
    const refused = async (pack: object) => {
      const answer = await shop.send('repairs', repairForm(bench.typeId, { pack: packForm(bench.typeId, pack) }));
      expect(answer.status).toBe(400);
      return answer.body.fields as Record<string, string>;
    };
    expect(await refused({ groupsPerModule: '4' })).toEqual({
      'pack.groupsPerModule': '2-series 66 Ah has 2 a module; 4 were typed. Change one of the two.',
    });
    expect(Object.keys(await refused({ groupCount: '9' }))).toEqual(['pack.groupsPerModule']);
  });

  test('keeps its groups once it was read; set aside, they may change', async () => {
    const page = await shop.read((await shop.book()).id, arrival);
    const other = repairForm(bench.typeId, { pack: packForm(bench.typeId, { groupCount: '96' }) });
    const refused = await change(page, other);
    expect([refused.status, refused.body.fields['pack.groupCount']]).toEqual([
      400,
      'This pack was read with 8 groups. Set its readings aside first, or leave it.',
    ]);
    const aside = await taken(
      shop.send(`repairs/${page.id}/readings/${page.readings[0]!.id}/set-aside`, { reason: 'The neighbour’s pack.' }),
    );
    expect((await change(aside, other)).body).toMatchObject({ pack: { groupCount: 96, moduleCount: 48 } });
  });

  test('of a type is made by managers, kept by repairs when the type changes, and keeps its module type from removal', async () => {
    const manager = bench.as('manager');
    const form = { name: 'Long pack', pack: packForm(bench.typeId), note: '' };
    await bench.as('foreman').post('/api/pack-types', form).expect(403);
    const type = (await manager.post('/api/pack-types', form).expect(201)).body as PackTypeDto;
    expect(type.pack).toMatchObject({ moduleCount: 4, moduleTypeName: '2-series 66 Ah' });
    expect((await manager.post('/api/pack-types', form)).body.fields.name).toContain('Long pack already');
    const page = await shop.book({ packTypeId: type.id });
    expect(page.packTypeName).toBe('Long pack');
    const changed = { ...form, pack: packForm(bench.typeId, { groupCount: '12' }) };
    await manager.patch(`/api/pack-types/${type.id}`, changed).set('If-Match', '"1"').expect(200);
    expect((await manager.patch(`/api/pack-types/${type.id}`, changed).set('If-Match', '"1"')).status).toBe(412);
    expect((await shop.seen(page.id)).pack.groupCount).toBe(8);
    const removal = await manager.delete(`/api/module-types/${bench.typeId}`).set('If-Match', '"1"');
    expect([removal.status, removal.body.detail]).toEqual([
      409,
      '2-series 66 Ah stands in 2 packs. A type in use cannot be removed.',
    ]);
  });
});

describe('what was booked', () => {
  test('changes with its revision only', async () => {
    const page = await shop.book();
    const form = repairForm(bench.typeId, { vehicle: 'Green van', personIds: ['own-foreman', 'own-technician'] });
    expect((await change(page, form, 7)).body).toMatchObject({ status: 412, present: { vehicle: 'Grey van' } });
    const changed = (await change(page, form).expect(200)).body as RepairPageDto;
    expect(changed).toMatchObject({
      vehicle: 'Green van',
      rev: page.rev + 1,
      personIds: ['own-foreman', 'own-technician'],
    });
    expect(changed.people[0]!.name).toBe('Foreman of own');
    expect((await change(changed, { ...form, personIds: ['other-foreman'] })).body.fields).toHaveProperty(
      'personIds.0',
    );
  });

  test('is found by number, vehicle, bay, customer, person and spare, in any case of letters', async () => {
    const first = await shop.book({ vehicle: 'Grün Kombi', bay: 'bay 6', personIds: ['own-foreman'] });
    await shop.book({ vehicle: 'Brown hatchback', customerName: '100% Fleet', bay: null });
    await taken(shop.send(`repairs/${first.id}/spare`, { spareId: await bench.spare('S-0417') }));
    for (const looked of ['r-1', 'GRÜN', 'Bay 6', 'foreman of', 's-0417'])
      expect(await numbers(`?q=${encodeURIComponent(looked)}`)).toEqual(['R-1']);
    expect(await numbers(`?q=${encodeURIComponent('100%')}`)).toEqual(['R-2']);
    await taken(shop.send(`repairs/${first.id}/hand-over`, { note: 'Sold as it is.' }));
    expect(await numbers(`?state=handed-over&q=${encodeURIComponent('GRÜN')}`)).toEqual(['R-1']);
    expect(await numbers('?state=handed-over&q=brown')).toEqual([]);
  });
});

describe('the list', () => {
  test('has what needs somebody first, then by module ready, then by promise, and counts', async () => {
    const promised = (hours: number) => new Date(bench.server.clock.now() + hours * hour).toISOString();
    const late = await shop.book({ promisedAt: promised(48) });
    const soon = await shop.book({ promisedAt: promised(5) });
    const charged = await shop.take(await shop.read((await shop.book()).id, arrival));
    await shop.plan(charged, await bench.spare('S-0417'));
    const read = await shop.read((await shop.book()).id, arrival);
    await shop.confirm(read, { pointsTo: '3' });
    const { repairs, counts, nextPage } = await list();
    expect(repairs.map(({ number }) => number)).toEqual([read, charged, soon, late].map(({ number }) => number));
    expect(counts).toEqual({ open: 4, needsSomebody: 1, waiting: 1, handedOver: 0 });
    expect([nextPage, repairs[0]!.needsSomebody, repairs[1]!.waits]).toEqual([null, true, true]);
  });

  test('comes in pages of 50, of those that are over too', async () => {
    for (let count = 0; count < 51; count += 1) await shop.book();
    const first = await list();
    expect([first.repairs.length, first.nextPage]).toEqual([50, 2]);
    const second = await list('?page=2');
    expect([second.repairs.length, second.nextPage]).toEqual([1, null]);
    for (const { id } of [...first.repairs, ...second.repairs])
      await taken(shop.send(`repairs/${id}/hand-over`, { note: 'Closed.' }));
    const over = await list('?state=handed-over');
    expect([over.repairs.length, over.nextPage, over.counts.handedOver]).toEqual([50, 2, 51]);
    expect((await list('?state=handed-over&page=2')).repairs).toHaveLength(1);
  });
});
