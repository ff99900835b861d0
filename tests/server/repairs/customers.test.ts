import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { makeBench, type Bench } from '../charges/bench';
import type { CustomerExportDto } from '@/shared/contract/customer';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Role } from '@/shared/contract/roles';
import type { WorkListDto } from '@/shared/contract/work';
import { workForm } from '@/tests/support/benched';
import { arrival, makeShop, stripOf, taken, type Shop } from './shop';

const name = 'Élodie Marten (Quay)';
const contact = 'elodie@quay.example.com';

let bench: Bench;
let shop: Shop;
let first: RepairPageDto;
let second: RepairPageDto;
let namesake: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  const of = { customerName: name, customerContact: contact };
  first = await shop.book({ ...of, vehicle: `Van of ${name}`, note: `Ring ${contact} before noon` });
  first = await shop.take(await shop.confirm(await shop.read(first.id, arrival)));
  first = await taken(
    shop.send(`repairs/${first.id}/removed`, {
      modulePosition: '2',
      fate: 'scrap',
      note: `${name.toUpperCase()} agreed`,
    }),
  );
  // Who agreed at the counter bears another name.
  first = await taken(
    shop.send(`repairs/${first.id}/advised`, {
      ...{ text: 'Coolant hose', outcome: 'declined', detail: `${name} rings back`, agreedBy: 'Corin Vell' },
    }),
  );
  const work = { title: `Wash the car of ${name}`, repairId: first.id, note: `Ring ${contact} when it is clean` };
  await shop.send('work', workForm(work)).expect(201);
  second = await shop.book({ ...of, customerName: ` ${name.toUpperCase()}` });
  namesake = await shop.book({ ...of, customerContact: 'another@quay.example.com' });
});
afterEach(() => bench.server.close());

const exported = (id: string, role: Role = 'manager') => bench.as(role).get(`/api/repairs/${id}/customer.json`);
const erase = (id: string, reason = 'Asked for in writing.', role: Role = 'manager') =>
  shop.send(`repairs/${id}/customer/erase`, { reason }, role);

/** Every row of every table, as text. */
async function everything(): Promise<string> {
  const { dataSource } = bench.server.deps;
  const tables: unknown[] = [];
  for (const { tableName } of dataSource.entityMetadatas)
    tables.push(await dataSource.query(`SELECT * FROM ${tableName}`));
  return JSON.stringify(tables);
}

test('a customer’s data is given out as one JSON file with both repairs, and without those of a namesake', async () => {
  const answer = await exported(first.id).expect(200);
  expect(answer.headers['content-disposition']).toBe('attachment; filename=customer-data.json');
  const data = answer.body as CustomerExportDto;
  expect([data.name, data.contact]).toEqual([name, contact]);
  expect(data.repairs.map(({ number }) => number)).toEqual([second.number, first.number]);
  const { note, removed, advised, work, log } = data.repairs[1]!;
  expect(work).toMatchObject([{ number: 'W-0001', title: `Wash the car of ${name}` }]);
  expect(data.repairs[0]!.work).toEqual([]);
  expect(advised).toMatchObject([{ text: 'Coolant hose', outcome: 'declined', agreedBy: 'Corin Vell' }]);
  expect([note, removed[0]!.note]).toEqual([`Ring ${contact} before noon`, `${name.toUpperCase()} agreed`]);
  expect(log.map(({ text }) => text)).toContain(`booked Van of ${name}`);
});

test('erasing takes name and contact out of every table, and leaves readings, target, steps and people', async () => {
  const stays = ({ readings, sources, target, pack, wait, number, bookedBy }: RepairPageDto) => ({
    ...{ readings, sources, target, pack, wait, number, bookedBy },
  });
  const page = await taken(erase(first.id));
  expect(page).toMatchObject({ customerName: null, customerContact: null, vehicle: 'Van of [erased]' });
  expect(page.note).toBe('Ring [erased] before noon');
  expect(page.removed[0]!.note).toBe('[erased] agreed');
  expect(page.advised).toMatchObject([{ text: 'Coolant hose', detail: '[erased] rings back', agreedBy: '[erased]' }]);
  expect(page.erased).toMatchObject({ reason: 'Asked for in writing.', by: { name: 'Manager of own' } });
  expect(page.events[0]!.text).toBe('customer’s data erased');
  expect([stays(page), stripOf(page)]).toEqual([stays(first), stripOf(first)]);
  expect((await shop.seen(second.id)).erased).not.toBeNull();
  const { work } = (await bench.as('technician').get('/api/work')).body as WorkListDto;
  expect(work).toMatchObject([{ title: 'Wash the car of [erased]', note: 'Ring [erased] when it is clean' }]);
  // The namesake is another customer, and stays.
  expect(await shop.seen(namesake.id)).toMatchObject({ customerName: name, erased: null });
  await taken(erase(namesake.id));
  const left = (await everything()).toLowerCase();
  for (const secret of ['élodie', 'marten', 'elodie@', 'another@', 'corin']) expect(left).not.toContain(secret);
  const found = await bench.as('manager').get(`/api/search?q=${encodeURIComponent('Élodie')}`);
  expect(found.body.hits).toEqual([]);
});

test('erasing twice changes nothing the second time, and the reason that was given stays', async () => {
  const once = await taken(erase(first.id, `${name} asked for it`));
  const again = await taken(erase(first.id, 'Again.'));
  expect([again.rev, again.events.length, again.erased]).toEqual([once.rev, once.events.length, once.erased]);
  expect(again.erased!.reason).toBe('[erased] asked for it');
  expect((await exported(first.id)).body).toMatchObject({
    name: null,
    contact: null,
    repairs: [{ number: first.number }],
  });
});

test('an answer stored for a retry is gone too: the retry is told to read it anew', async () => {
  const { key } = await import('../charges/bench');
  const kept = key();
  const book = { vehicle: 'Blue bus', customerName: name, customerContact: contact, packTypeId: null };
  const { repairForm } = await import('@/tests/support/repaired');
  const send = () =>
    bench.as('technician').post('/api/repairs', repairForm(bench.typeId, book)).set('Idempotency-Key', kept);
  const { body } = await send().expect(201);
  await send().expect(201);
  await taken(erase((body as RepairPageDto).id));
  const retried = await send();
  expect([retried.status, retried.body.code]).toEqual([409, 'done_already']);
});

describe('only a manager of the workshop', () => {
  test.each(['technician', 'foreman'] as const)('may do either: not a %s', async (role) => {
    await exported(first.id, role).expect(403);
    expect((await erase(first.id, 'Curious.', role)).status).toBe(403);
    expect((await shop.seen(first.id)).customerName).toBe(name);
  });

  test('of another one finds nothing, and an empty reason is refused', async () => {
    const other = bench.server.agentFor('manager', bench.server.other);
    await other.get(`/api/repairs/${first.id}/customer.json`).expect(404);
    await other.post(`/api/repairs/${first.id}/customer/erase`, { reason: 'Theirs.' }).expect(404);
    expect((await erase(first.id, ' ')).body.fields).toEqual({ reason: 'The reason is missing.' });
    expect((await shop.seen(first.id)).customerName).toBe(name);
  });
});
