import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import { readPdf } from '@/tests/support/pdf';
import { twoHalves } from '@/tests/support/pictures';
import { packForm } from '@/tests/support/repaired';
import { did, hour, key, makeBench, type Bench } from '../charges/bench';
import { arrival, chargedAndChecked, levelled, makeShop, taken, type Shop } from '../repairs/shop';

let bench: Bench;
let shop: Shop;
let folder: string;
beforeEach(async () => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-papers-'));
  bench = await makeBench({ config: { dataDir: folder } });
  shop = makeShop(bench);
});
afterEach(async () => {
  await bench.server.close();
  fs.rmSync(folder, { recursive: true, force: true });
});

/** Bytes of the sheet; kept where BIDEWELL_KEEP_PAPERS names a folder, to be looked at. */
async function sheet(id: string, query = '', role: 'technician' | 'manager' = 'technician'): Promise<Buffer> {
  const answer = await bench.as(role).get(`/api/repairs/${id}/hand-over.pdf${query}`).buffer(true).expect(200);
  expect(answer.headers['content-type']).toBe('application/pdf');
  return answer.body as Buffer;
}
const keep = (name: string, bytes: Buffer): void => {
  const kept = process.env.BIDEWELL_KEEP_PAPERS;
  if (kept) fs.writeFileSync(`${kept}/${name}.pdf`, bytes);
};
const flat = (text: string): string => text.replace(/\s+/g, ' ');

/** The repair of the lifecycle test, from its booking to its hand-over, with two things advised. */
async function whole(): Promise<RepairPageDto> {
  const spareId = await bench.spare('S-0417');
  let page = await shop.book({ personIds: ['own-technician'], customerName: 'T. Varga', note: 'Range halved.' });
  page = await shop.confirm(await shop.read(page.id, arrival));
  page = await shop.take(page);
  await taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
  const checked = await chargedAndChecked(bench, (await shop.plan(page, spareId)).id);
  await did(bench, checked, 'fit', { note: null }, 'foreman');
  await taken(shop.send(`repairs/${page.id}/removed`, { modulePosition: '2', fate: 'scrap', note: 'Swollen' }));
  bench.server.clock.advance(hour);
  await shop.read(page.id, levelled(38), { stage: 'after-fit' });
  bench.server.clock.advance(12 * hour);
  await shop.read(page.id, levelled(10), { stage: 'after-balance', balanceCount: 1 });
  const advise = (body: object) =>
    taken(shop.send(`repairs/${page.id}/advised`, { detail: '', agreedBy: '', ...body }));
  await advise({ text: '12 V battery', outcome: 'done' });
  await advise({ text: 'Coolant of the pack', outcome: 'declined', agreedBy: 'T. Varga' });
  return taken(shop.send(`repairs/${page.id}/hand-over`, { note: '' }));
}

describe('the hand-over sheet', () => {
  test('tells the story on page 1 of 2 and every group and the signatures on page 2 of 2, on A4 and on Letter', async () => {
    const page = await whole();
    const bytes = await sheet(page.id);
    keep('whole', bytes);
    const [story, groups, ...more] = await readPdf(bytes);
    expect(more).toEqual([]);
    expect([story!.width, story!.height].map((points) => Math.round((points * 25.4) / 72))).toEqual([210, 297]);
    const text = flat(story!.text);
    for (const part of [
      'Hand-over sheet, R-1',
      'page 1 of 2',
      'Grey van, 8 cell groups in 4 modules of 2',
      'range halved',
      'T. Varga',
      'Technician of own',
      // 3.852 V and 3.915 V against the median of eight: (3.949 + 3.949) / 2.
      'Module 2: G3 at 3.852 V, 97 mV below the median and G4 at 3.915 V, 34 mV below the median of 3.949 V.',
      'A hand meter at module 2 read 3.853 V and 3.916 V.',
      'The other 6 groups lay within 3 mV.',
      'module 2: 3.852 V, 3.915 V',
      'spread 99 mV',
      'spread 10 mV',
      'spare S-0417, 60.0 Ah measured',
      '3.949 V ±5 mV, checked at 3.950 V and 3.948 V',
      'scrapped: Swollen',
      '12 V battery done',
      'Coolant of the pack declined by the owner. Agreed: T. Varga',
      'Cautions.',
      'An aid to trained people.',
    ])
      expect(text).toContain(part);
    // Millivolts and ampere-hours of each reading, as the repair's own page has them.
    for (const reading of page.readings) {
      expect(text).toContain(`${reading.spreadMillivolts.toFixed(0)} mV ${reading.spreadAmpHours!.toFixed(1)} Ah`);
    }
    const table = flat(groups!.text);
    expect(table).toContain('page 2 of 2');
    arrival.forEach((volts, group) => {
      const star = group === 2 || group === 3 ? ' *' : '';
      const after = group === 3 ? '3.940' : '3.950';
      expect(table).toContain(`G${group + 1}${star} ${volts.toFixed(3)} ${after}`);
    });
    expect(table).toContain('* replaced: module 2 is G3, G4.');
    expect(table).toContain('Handed over, Technician of own Received, T. Varga');
    expect(table).toContain('An aid to trained people.');

    const letter = await sheet(page.id, '?paper=letter');
    keep('letter', letter);
    const read = await readPdf(letter);
    expect([read[0]!.width, read[0]!.height, read.length]).toEqual([612, 792, 2]);
  });

  test('is the same to the byte for the same state, days later and for another person, and another once it changes', async () => {
    const page = await whole();
    const first = await sheet(page.id);
    bench.server.clock.advance(72 * hour);
    expect((await sheet(page.id, '', 'manager')).equals(first)).toBe(true);
    await taken(
      shop.send(`repairs/${page.id}/advised`, { text: 'New tyres', outcome: 'open', detail: '', agreedBy: '' }),
    );
    expect((await sheet(page.id)).equals(first)).toBe(false);
  });

  test('has decimal commas for a device that writes them', async () => {
    const page = await shop.read((await shop.book()).id, arrival);
    const [story] = await readPdf(await sheet(page.id, '?decimal=comma'));
    expect(story!.text).toContain('3,852 V');
    expect(story!.text).not.toContain('3.852');
  });

  test('says what is missing where a repair is handed over unread or unproven', async () => {
    const booked = await shop.book({ customerName: '' });
    const unread = await readPdf(await sheet(booked.id));
    expect(flat(unread[0]!.text)).toContain('The pack was not read.');
    await taken(shop.send(`repairs/${booked.id}/hand-over`, { note: 'Taken along as it is.' }));
    const [story] = await readPdf(await sheet(booked.id));
    expect(flat(story!.text)).toContain(
      'Not done read, second source, target, spare, charge, fit and prove: Taken along as it is',
    );
    expect(flat(story!.text)).toContain('The pack was not read after the work: that it is in line is not proven.');
  });

  test('says that a module went back in against the advice, with what was advised', async () => {
    const page = await shop.read((await shop.book()).id, arrival);
    const note = 'An exchange was advised; the owner sells the car.';
    await taken(shop.send(`repairs/${page.id}/removed`, { modulePosition: '2', fate: 'went-back-in', note }));
    const [story] = await readPdf(await sheet(page.id));
    expect(flat(story!.text)).toContain(
      'Module 2 went back in against our advice: An exchange was advised; the owner sells the car.',
    );
  });

  test.each([
    [1, 1, 2],
    [12, 2, 2],
    [96, 2, 2],
    [400, 8, 4],
  ])('holds every one of %i groups before and after, nothing over the edge of a page', async (count, per, most) => {
    const pack = packForm(per === 2 ? bench.typeId : null, { groupCount: String(count), groupsPerModule: String(per) });
    const { id } = await shop.book({ pack, customerName: 'T. Varga' });
    // Each group its own voltage, so that one that is left out or stands twice shows.
    const before = Array.from({ length: count }, (_, group) => 3.9 + ((group * 7) % count) / 10_000);
    if (count > 1) before[Math.floor(count / 2)] = 3.82;
    const rounded = before.map((volts) => Number(volts.toFixed(3)));
    const after = rounded.map((_, group) => Number((3.95 + (group % 9) / 1000).toFixed(3)));
    await shop.read(id, rounded, { groupVolts: rounded, packVolts: '' });
    await shop.read(id, after, { groupVolts: after, packVolts: '', stage: 'after-fit' });
    const bytes = await sheet(id);
    keep(`groups-${count}`, bytes);
    const pages = await readPdf(bytes);
    expect(pages.length).toBeLessThanOrEqual(most);
    const table = flat(
      pages
        .slice(1)
        .map(({ text }) => text)
        .join(' '),
    );
    rounded.forEach((volts, group) =>
      expect(table).toContain(`G${group + 1} ${volts.toFixed(3)} ${after[group]!.toFixed(3)}`),
    );
    pages.forEach(({ text, pieces, width, height }, place) => {
      expect(text).toContain(`page ${place + 1} of ${pages.length}`);
      expect(text).toContain('An aid to trained people.');
      for (const { x, y, text: piece } of pieces) {
        // 18 mm are 51 pt; a baseline may stand 3 pt over the margin's edge.
        expect(x, piece).toBeGreaterThanOrEqual(51);
        expect(x, piece).toBeLessThan(width - 51);
        expect(y, piece).toBeGreaterThanOrEqual(51);
        expect(y, piece).toBeLessThanOrEqual(height - 48);
      }
    });
  });

  test('carries 7 photos, 6 on page 3 and 1 on page 4, each with what was noted, and is the same to the byte again', async () => {
    const page = await shop.read((await shop.book()).id, arrival);
    const to = `/api/repairs/${page.id}/photos`;
    for (let shot = 1; shot <= 7; shot += 1) {
      // Upright and lying ones in turn, each of its own size.
      const size: [number, number] = shot % 2 === 0 ? [300, 400 + shot] : [400 + 2 * shot, 300];
      const jpeg = await twoHalves(...size)
        .jpeg()
        .toBuffer();
      bench.server.clock.advance(1);
      const upload = bench.as('technician').upload(to, 'photo', jpeg, 'p.jpg');
      const photo = (await taken(upload.set('Idempotency-Key', key()))).photos[0]!;
      if (shot !== 2) continue;
      bench.server.clock.advance(1);
      const form = { caption: 'Bulged at the left', seen: 'swelling', modulePosition: '2', spareId: null };
      await taken(bench.as('technician').patch(`/api/photos/${photo.id}`, form).set('If-Match', '"1"'));
    }
    const bytes = await sheet(page.id);
    keep('photos', bytes);
    const pages = await readPdf(bytes);
    expect(pages.map(({ images }) => images.length)).toEqual([0, 0, 6, 1]);
    expect(flat(pages[1]!.text)).toContain('7 photos come after this page.');
    const third = flat(pages[2]!.text);
    expect(third).toContain('Photo 1: The pack');
    expect(third).toContain('Photo 2: Module 2, swelling');
    expect(third).toContain('Bulged at the left. Technician, ');
    expect(third).toContain('page 3 of 4');
    expect(flat(pages[3]!.text)).toContain('Photo 7: The pack');
    for (const { images, width, height } of pages)
      for (const { x, y, width: wide, height: high } of images) {
        expect([x >= 51, y >= 51, x + wide <= width - 50.9, y + high <= height - 51]).toEqual([true, true, true, true]);
      }
    // Red at the left and blue at the right, in the proportions of the picture that was sent.
    const [first, second] = pages[2]!.images;
    expect(first!.width / first!.height).toBeCloseTo(402 / 300, 2);
    expect(second!.width / second!.height).toBeCloseTo(300 / 402, 2);
    expect((await sheet(page.id)).equals(bytes)).toBe(true);

    const [gone] = fs.readdirSync(`${folder}/photos`).filter((name) => !name.endsWith('.thumb.jpg'));
    fs.rmSync(`${folder}/photos/${gone}`);
    const without = await readPdf(await sheet(page.id));
    expect(without.flatMap(({ images }) => images)).toHaveLength(6);
    expect(flat(without.map(({ text }) => text).join(' '))).toContain('The file of this photo is gone.');
  });

  test('is there for every role of the workshop, and for nobody else', async () => {
    const page = await shop.read((await shop.book()).id, arrival);
    const path = `/api/repairs/${page.id}/hand-over.pdf`;
    for (const role of ['technician', 'foreman', 'manager'] as const) await bench.as(role).get(path).expect(200);
    expect((await bench.server.agentFor('manager', bench.server.other).get(path)).status).toBe(404);
    expect((await bench.server.anyone.get(path)).status).toBe(401);
    expect((await bench.as('technician').get(`${path}?paper=a3`)).status).toBe(400);
  });
});

describe('what was advised', () => {
  const item = { text: 'Coolant of the pack', outcome: 'open', detail: '', agreedBy: '' };
  const path = (page: RepairPageDto, id = page.advised[0]!.id) => `/api/repairs/${page.id}/advised/${id}`;

  test('is declined only with the customer’s name, which has its instant; another outcome is agreed to anew', async () => {
    let page = await shop.book();
    const refused = await shop.send(`repairs/${page.id}/advised`, { ...item, outcome: 'declined' });
    expect([refused.status, refused.body.fields.agreedBy]).toEqual([
      400,
      'Type the name of the customer who declined it.',
    ]);
    page = await taken(shop.send(`repairs/${page.id}/advised`, { ...item, outcome: 'declined', agreedBy: 'T. Varga' }));
    const typedAt = page.advised[0]!.agreedAt;
    expect(typedAt).toBe(new Date(bench.server.clock.now()).toISOString());
    expect(page.events[0]!.text).toBe('advised: Coolant of the pack, declined by the owner, agreed by T. Varga');
    const change = async (body: object) => {
      bench.server.clock.advance(hour);
      return taken(
        bench
          .as('foreman')
          .patch(path(page), { ...item, ...body })
          .set('If-Match', `"${page.rev}"`),
      );
    };
    page = await change({ outcome: 'declined', agreedBy: 'T. Varga', detail: 'too dear' });
    expect(page.advised[0]!.agreedAt).toBe(typedAt);
    page = await change({ outcome: 'booked', agreedBy: 'T. Varga', detail: '8 September' });
    expect(page.advised[0]).toMatchObject({
      outcome: 'booked',
      agreedAt: new Date(bench.server.clock.now()).toISOString(),
    });
  });

  test('is changed and taken back only as it was seen, and not from another workshop', async () => {
    const page = await taken(shop.send(`repairs/${(await shop.book()).id}/advised`, item));
    expect((await bench.as('technician').patch(path(page), item).set('If-Match', '"1"')).status).toBe(412);
    const foreign = bench.server.agentFor('manager', bench.server.other).delete(path(page));
    expect((await foreign.set('If-Match', `"${page.rev}"`)).status).toBe(404);
    const unknown = bench.as('technician').delete(path(page, 'nobody-has-this')).set('If-Match', `"${page.rev}"`);
    expect((await unknown).status).toBe(404);
    bench.server.clock.advance(1);
    const gone = await taken(bench.as('technician').delete(path(page)).set('If-Match', `"${page.rev}"`));
    expect(gone.advised).toEqual([]);
    expect(gone.events[0]!.text).toBe('advice taken back: Coolant of the pack, not answered yet');
  });
});
