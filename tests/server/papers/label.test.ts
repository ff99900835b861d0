import { writeFileSync } from 'node:fs';
import jsQR from 'jsqr';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { drawLabel } from '@/server/papers/label';
import { drawnBoxes, readPdf, type Box } from '@/tests/support/pdf';
import { kept, makeBench, type Bench } from '../charges/bench';
import { arrival, chargedAndChecked, makeShop } from '../repairs/shop';

const mm = 72 / 25.4;
const keep = (name: string, bytes: Buffer): void => {
  const folder = process.env.BIDEWELL_KEEP_PAPERS;
  if (folder) writeFileSync(`${folder}/${name}.pdf`, bytes);
};

/** Reads the code as a scanner of 12 points a millimetre would see the boxes on white paper. */
function scanned(boxes: readonly Box[]): string | null {
  const scale = 12 / mm;
  const [width, height] = [62 * 12, 40 * 12];
  const pixels = new Uint8ClampedArray(width * height * 4).fill(255);
  for (const box of boxes)
    for (let y = Math.round(box.y * scale); y < Math.round((box.y + box.height) * scale); y += 1)
      for (let x = Math.round(box.x * scale); x < Math.round((box.x + box.width) * scale); x += 1)
        pixels.fill(0, (y * width + x) * 4, (y * width + x) * 4 + 3);
  return jsQR(pixels, width, height)?.data ?? null;
}

const label = (count: number) => ({
  title: 'R-2409',
  spare: 'S-0402',
  position: 'module 5',
  line: '2-series 66 Ah, to 3.964 V ±5 mV',
  volts: Array.from({ length: count }, (_, group) => (3.95 + group / 1000).toFixed(3)),
  ready: 'ready Tue 9 June 14:31, Ines',
});

describe('the label as PDF', () => {
  let bench: Bench;
  let proven: ChargeDto;
  beforeAll(async () => {
    bench = await makeBench();
    const shop = makeShop(bench);
    const spareId = await bench.spare('S-0417');
    const page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
    proven = await chargedAndChecked(bench, (await shop.plan(page, spareId)).id);
  });
  afterAll(() => bench.server.close());

  test('is one page of 62 × 40 mm with the repair 9 mm high, the spare, the module, the volts and who found it ready', async () => {
    const answer = await bench.as('technician').get(`/api/charges/${proven.id}/label.pdf`).buffer(true).expect(200);
    expect(answer.headers['content-disposition']).toContain('label-S-0417.pdf');
    const bytes = answer.body as Buffer;
    keep('label', bytes);
    const [page, ...more] = await readPdf(bytes);
    expect([page!.width / mm, page!.height / mm, more.length].map(Math.round)).toEqual([62, 40, 0]);
    for (const text of ['R-1', 'S-0417', 'module 2', '2-series 66 Ah, to 3.949 V ±5 mV', 'G1', '3.950', 'G2', '3.948'])
      expect(page!.text.split('\n')).toContain(text);
    expect(page!.text).toMatch(/ready \w{3} \d+ June \d\d:\d\d, Technician/);
    // Capitals are .7 of the size high.
    expect((page!.pieces.find(({ text }) => text === 'R-1')!.height * 0.7) / mm).toBeGreaterThan(8.5);
    for (const { x, y } of page!.pieces) {
      expect(x / mm).toBeGreaterThan(2);
      expect(x / mm).toBeLessThan(60);
      expect(y / mm).toBeLessThan(39.5);
    }
  });

  test('carries a code that another library reads as the charge’s address under the name the server was asked by', async () => {
    const answer = await bench.as('technician').get(`/api/charges/${proven.id}/label.pdf`).buffer(true);
    const host = answer.request.url.split('/')[2];
    expect(scanned(drawnBoxes(answer.body as Buffer))).toBe(`http://${host}/charges/${proven.id}`);
  });

  test('is the same to the byte for the same charge, and has commas for a device that writes them', async () => {
    const get = async (query: string) => {
      // The code holds the address: it has to be asked for by the same name.
      const asked = bench
        .as('technician')
        .get(`/api/charges/${proven.id}/label.pdf${query}`)
        .set('Host', 'bench.example.com');
      return (await asked.buffer(true)).body as Buffer;
    };
    const first = await get('');
    bench.server.clock.advance(3_600_000);
    expect((await get('')).equals(first)).toBe(true);
    expect((await readPdf(await get('?decimal=comma')))[0]!.text).toContain('3,950');
  });

  test('is refused with the reason for what is not proven, and not there for another workshop', async () => {
    const open = await kept(bench, { spareId: await bench.spare('S-0418') });
    const refused = await bench.as('technician').get(`/api/charges/${open.id}/label.pdf`);
    expect([refused.status, refused.body.code, refused.body.detail]).toEqual([
      409,
      'no_label',
      'A label says that a module is ready. This one is not checked and in tolerance.',
    ]);
    const path = `/api/charges/${proven.id}/label.pdf`;
    for (const role of ['foreman', 'manager'] as const) await bench.as(role).get(path).expect(200);
    expect((await bench.server.agentFor('manager', bench.server.other).get(path)).status).toBe(404);
    expect((await bench.server.anyone.get(path)).status).toBe(401);
  });
});

test.each([1, 4, 6, 12, 13])('keeps its code readable and its marks on the paper with %i groups', async (count) => {
  const url = 'https://bidewell.example.com/charges/0d6f3f0a-6a5e-4f4e-9d8c-2f5f5c0a3e11';
  const bytes = await drawLabel(label(count), url, Date.UTC(2026, 5, 9, 12, 31));
  keep(`label-${count}`, bytes);
  expect(scanned(drawnBoxes(bytes))).toBe(url);
  const [page] = await readPdf(bytes);
  for (const { x, y } of page!.pieces) {
    expect(x / mm).toBeGreaterThan(2);
    expect(y / mm).toBeLessThan(39.5);
  }
});
