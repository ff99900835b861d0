import fc from 'fast-check';
import Papa from 'papaparse';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { csvLines } from '@/server/services/csv';
import { makeBench, minute, type Bench } from '../charges/bench';
import { arrival, makeShop, taken, type Shop } from './shop';

/** What spreadsheets run: OWASP's list of what a cell may not begin with, white space before it set aside. */
const runs = (cell: string): boolean => /^[=+\-@]/.test(cell.trimStart()) || /^[\t\r\n]/.test(cell);

describe('a cell', () => {
  test.each(['=1+1', '+49 431 55', '-2', '@sum(a1)', '\tx', '\rx', ' =1+1', '=1\n+1', '=cmd|"/c calc"!A1', '＝1+1'])(
    'beginning as a formula stands behind an apostrophe: %j',
    (text) => {
      const [[cell]] = Papa.parse<[string]>(csvLines([[text, 'next']]), { newline: '\r\n' }).data as [[string]];
      expect(cell).toBe(`'${text}`);
    },
  );

  test('that is a number stays one, and a plain text stays as it is', () => {
    expect(csvLines([[-7, 3.968, null, 'R-1', 'a=b', '−7 mV', 'say "ah"; then', '3-series']])).toBe(
      '-7,3.968,,R-1,a=b,−7 mV,"say ""ah""; then",3-series\r\n',
    );
  });

  test('of whatever text comes back whole and is run by no spreadsheet, in 1,000 of them', () => {
    const texts = fc.array(
      fc.oneof(fc.string({ unit: 'grapheme' }), fc.stringMatching(/^[\t\r\n =+@-]{1,3}[a-z0-9"',;\n=]{0,6}$/)),
      { minLength: 1, maxLength: 5 },
    );
    fc.assert(
      fc.property(texts, (row) => {
        const [read = []] = Papa.parse<string[]>(csvLines([['x', ...row]]), { delimiter: ',', newline: '\r\n' }).data;
        for (const [at, text] of row.entries()) {
          const cell = read[at + 1]!;
          expect(runs(cell)).toBe(false);
          expect([text, `'${text}`]).toContain(cell);
        }
      }),
      { numRuns: 1000 },
    );
  });
});

describe('repairs.csv', () => {
  let bench: Bench;
  let shop: Shop;
  beforeAll(async () => {
    bench = await makeBench();
    shop = makeShop(bench);
    const one = await shop.book({
      vehicle: '=HYPERLINK("http://evil.example.com","van")',
      customerName: '+Quay',
      bay: '@3',
    });
    await shop.take(await shop.confirm(await shop.read(one.id, arrival)));
    bench.server.clock.advance(90 * minute);
    const over = await shop.book({ vehicle: 'Red bus', customerName: null });
    await taken(shop.send(`repairs/${over.id}/hand-over`, { note: 'As it is.' }));
    const gone = await shop.book({ vehicle: 'Doubled' });
    await taken(shop.send(`repairs/${gone.id}/delete`, { reason: 'Booked twice.' }, 'manager'));
  });
  afterAll(() => bench.server.close());
  const rows = async (query = '') => {
    const answer = await bench.as('foreman').get(`/api/repairs.csv${query}`).expect(200);
    expect(answer.headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(answer.headers['content-disposition']).toBe('attachment; filename=repairs-2026-06-09.csv');
    expect(answer.text.startsWith('\ufeff')).toBe(true);
    return Papa.parse<Record<string, string>>(answer.text.slice(1), { header: true, skipEmptyLines: true }).data;
  };

  test('has a row a repair but the deleted ones, its numbers as numbers and no cell that is run', async () => {
    const [open, over, ...more] = await rows();
    expect(more).toEqual([]);
    expect(open).toMatchObject({
      ...{ Number: 'R-1', Vehicle: `'=HYPERLINK("http://evil.example.com","van")`, Bay: "'@3", Customer: "'+Quay" },
      ...{ State: 'open', Step: 'Spare', Groups: '8', Modules: '4', 'Failing module': '2', 'Waited, min': '90' },
    });
    expect(Number(open!['Target, V'])).toBeCloseTo(3.949, 2);
    expect(Number(open!['Spread, mV'])).toBe(99);
    expect(over).toMatchObject({ Vehicle: 'Red bus', State: 'handed over', Customer: '', 'Waited, min': '' });
    for (const row of [open!, over!]) for (const cell of Object.values(row)) expect(runs(cell)).toBe(false);
  });

  test('is of the state and the search that were asked for', async () => {
    expect((await rows('?state=deleted')).map(({ Vehicle }) => Vehicle)).toEqual(['Doubled']);
    expect((await rows('?q=red')).map(({ Vehicle }) => Vehicle)).toEqual(['Red bus']);
  });

  test('is for a foreman and a manager of the workshop', async () => {
    await bench.as('technician').get('/api/repairs.csv').expect(403);
    const other = await bench.server.agentFor('manager', bench.server.other).get('/api/repairs.csv').expect(200);
    expect(other.text.trim().split('\r\n')).toHaveLength(1);
  });
});
