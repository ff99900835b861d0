import { afterAll, beforeAll, expect, test } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Role } from '@/shared/contract/roles';
import type { SearchDto } from '@/shared/contract/search';
import { makeBench, type Bench } from '../charges/bench';
import { arrival, makeShop, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
let repair: RepairPageDto;
let chargeNumber: string;
beforeAll(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  const spareId = await bench.spare('S-0417');
  await bench.spare('S-04');
  await bench.spare('S-0499');
  repair = await shop.book({ vehicle: 'Überland bus', customerName: 'Élise 100%_ Fahrten', bay: 'bay 7' });
  repair = await shop.take(await shop.confirm(await shop.read(repair.id, arrival)));
  chargeNumber = (await shop.plan(repair, spareId)).number;
  const deleted = await shop.book({ vehicle: 'Doubled tractor' });
  await taken(shop.send(`repairs/${deleted.id}/delete`, { reason: 'Booked twice.' }, 'manager'));
  const over = await shop.book({ vehicle: 'Red tractor' });
  await taken(shop.send(`repairs/${over.id}/hand-over`, { note: 'As it is.' }));
});
afterAll(() => bench.server.close());

const found = async (q: string, role: Role = 'technician') => {
  const answer = await bench
    .as(role)
    .get(`/api/search?q=${encodeURIComponent(q)}`)
    .expect(200);
  return (answer.body as SearchDto).hits.map((hit) =>
    hit.kind === 'spare'
      ? `spare ${hit.label}`
      : hit.kind === 'repair'
        ? `repair ${hit.vehicle}`
        : `charge ${hit.number}`,
  );
};

test.each([
  ['a repair by its number', () => repair.number, 'repair Überland bus'],
  ['a repair by its vehicle, in capitals too', () => 'ÜBERLAND', 'repair Überland bus'],
  ['a repair by its customer’s name', () => 'élise', 'repair Überland bus'],
  ['a repair by two words of two columns', () => 'bus 7', 'repair Überland bus'],
  ['a repair by the type of its modules', () => '2-series bus', 'repair Überland bus'],
  ['a repair by the spare of its charge', () => '0417', 'repair Überland bus'],
  ['a spare by a part of its label', () => '0417', 'spare S-0417'],
  ['a charge by the repair it is for', () => repair.number, () => `charge ${chargeNumber}`],
  ['a charge by its spare', () => 's-0417', () => `charge ${chargeNumber}`],
])('finds %s', async (_what, q, hit) => {
  expect(await found(q())).toContain(typeof hit === 'string' ? hit : hit());
});

test('puts the label that was typed before those that begin with it, and says what each is and where', async () => {
  expect((await found('s-04')).filter((one) => one.startsWith('spare'))).toEqual([
    'spare S-04',
    'spare S-0417',
    'spare S-0499',
  ]);
  const { body } = await bench.as('technician').get('/api/search?q=s-0417').expect(200);
  expect((body as SearchDto).hits).toEqual([
    expect.objectContaining({ kind: 'repair', state: 'open', number: repair.number }),
    expect.objectContaining({ kind: 'spare', where: 'charge', typeName: '2-series 66 Ah' }),
    expect.objectContaining({ kind: 'charge', stage: 'planned', title: repair.number, spareLabel: 'S-0417' }),
  ]);
});

test('finds a deleted repair for a manager only, and one handed over for everybody', async () => {
  expect(await found('tractor')).toEqual(['repair Red tractor']);
  expect((await found('tractor', 'manager')).sort()).toEqual(['repair Doubled tractor', 'repair Red tractor']);
});

test('takes the marks of the database’s own search as letters', async () => {
  expect(await found('%')).toEqual(await found('_'));
  expect(await found('100%')).toEqual(['repair Überland bus']);
  expect(await found('zzz%')).toEqual([]);
  expect(await found("' OR 1=1 --")).toEqual([]);
});

test('finds nothing of another workshop, and refuses an empty search, one of 61 letters, and who is not signed in', async () => {
  const other = bench.server.agentFor('manager', bench.server.other);
  for (const q of [repair.number, 'S-0417', 'bus'])
    expect((await other.get(`/api/search?q=${q}`)).body).toEqual({ hits: [], more: false });
  for (const q of ['', '%20', 'x'.repeat(61)]) await bench.as('technician').get(`/api/search?q=${q}`).expect(400);
  await bench.as('technician').get('/api/search').expect(400);
  await bench.server.anyone.get('/api/search?q=bus').expect(401);
});
