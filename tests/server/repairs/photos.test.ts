import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { Photo } from '@/server/entities/photo';
import type { PhotoDto } from '@/shared/contract/photo';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { SpareDto } from '@/shared/contract/spare';
import type { Role } from '@/shared/contract/roles';
import { key, makeBench, type Bench } from '../charges/bench';
import { arrival, makeShop, taken, type Shop } from './shop';
import { jpegMarkers, placedPhoto, twoHalves } from '@/tests/support/pictures';

let folder: string;
let bench: Bench;
let shop: Shop;
let page: RepairPageDto;
let jpeg: Buffer;
beforeEach(async () => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-photos-'));
  bench = await makeBench({ config: { dataDir: folder } });
  shop = makeShop(bench);
  page = await shop.book();
  jpeg = await twoHalves().jpeg().toBuffer();
});
afterEach(async () => {
  await bench.server.close();
  fs.rmSync(folder, { recursive: true, force: true });
});

const kept = (): string[] => {
  const photos = path.join(folder, 'photos');
  return fs.existsSync(photos) ? fs.readdirSync(photos).sort() : [];
};
const rows = () => bench.server.deps.dataSource.manager.countBy(Photo, {});
// No two acts of a person happen at the same millisecond.
const as = (role: Role) => {
  bench.server.clock.advance(1);
  return bench.as(role);
};
const upload = (bytes: Buffer, name = 'photo.jpg', idempotencyKey = key()) =>
  as('technician')
    .upload(`/api/repairs/${page.id}/photos`, 'photo', bytes, name)
    .set('Idempotency-Key', idempotencyKey);
const added = async (bytes = jpeg): Promise<PhotoDto> => (await taken(upload(bytes))).photos[0]!;
const note = (photo: PhotoDto, change: object, rev = photo.rev) =>
  as('technician')
    .patch(`/api/photos/${photo.id}`, { caption: '', seen: 'none', modulePosition: '', spareId: null, ...change })
    .set('If-Match', `"${rev}"`);

describe('a photo', () => {
  test('is turned upright and kept as a JPEG with nothing beside its picture: no place, maker or owner', async () => {
    const sent = await placedPhoto();
    expect(jpegMarkers(sent)).toContain('e1');
    expect(sent.toString('latin1')).toContain('harbour lane 3');
    const photo = await added(sent);
    // Lying on its side it was 400 × 200.
    expect([photo.width, photo.height]).toEqual([200, 400]);
    for (const what of ['', '/thumbnail']) {
      const { body } = await bench.as('technician').get(`/api/photos/${photo.id}${what}`).expect(200);
      const bytes = body as Buffer;
      for (const marker of ['e1', 'e2', 'ed', 'fe']) expect(jpegMarkers(bytes)).not.toContain(marker);
      for (const secret of ['Quay Bakery', 'Invented', 'harbour lane', 'GPS', 'Exif'])
        expect(bytes.toString('latin1')).not.toContain(secret);
      const { data, info } = await sharp(bytes).raw().toBuffer({ resolveWithObject: true });
      // Orientation 6: what was left is at the top now, and that was red.
      expect(data[0]! > 200 && data[2]! < 60).toBe(true);
      const last = (info.height * info.width - 1) * info.channels;
      expect(data[last]! < 60 && data[last + 2]! > 200).toBe(true);
    }
  });

  test('of 4,000 px is kept at 2,400 and its thumbnail at 360, under a random name that only its owner reads', async () => {
    const photo = await added(await twoHalves(4000, 2000).png().toBuffer());
    expect([photo.width, photo.height]).toEqual([2400, 1200]);
    const thumbnail = await bench.as('technician').get(`/api/photos/${photo.id}/thumbnail`).expect(200);
    const { width, height } = await sharp(thumbnail.body as Buffer).metadata();
    expect([width, height]).toEqual([360, 180]);
    const [picture, small] = kept();
    expect(picture).toMatch(/^[0-9a-f]{32}\.jpg$/);
    expect(small).toBe(picture!.replace('.jpg', '.thumb.jpg'));
    for (const file of kept()) expect(fs.statSync(path.join(folder, 'photos', file)).mode & 0o777).toBe(0o600);
    expect(JSON.stringify(await shop.seen(page.id))).not.toContain(picture!.slice(0, 32));
  });

  test('is taken as WebP and PNG too, whatever its name says', async () => {
    await taken(upload(await twoHalves().webp().toBuffer(), '../../etc/passwd'));
    page = await taken(upload(await twoHalves().png().toBuffer(), 'table.csv'));
    expect(page.photos).toHaveLength(2);
    expect(page.events[0]!.text).toBe('photo added');
    expect(kept()).toHaveLength(4);
    expect(fs.readdirSync(folder)).toEqual(['photos']);
  });

  test('is given out to its workshop alone, each time anew, as a picture and nothing else', async () => {
    const photo = await added();
    const address = `/api/photos/${photo.id}`;
    const answer = await bench.as('foreman').get(address).expect(200);
    expect(answer.headers).toMatchObject({
      'content-type': 'image/jpeg',
      'cache-control': 'private, no-cache',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
    });
    await bench.as('technician').get(address).set('If-None-Match', answer.headers.etag!).expect(304);
    await bench.server.anyone.get(address).expect(401);
    const { other } = bench.server;
    for (const what of ['', '/thumbnail'])
      await bench.server.agentFor('manager', other).get(`${address}${what}`).expect(404);
    await bench.server
      .agentFor('manager', other)
      .upload(`/api/repairs/${page.id}/photos`, 'photo', jpeg, 'photo.jpg')
      .set('Idempotency-Key', key())
      .expect(404);
    expect(kept()).toHaveLength(2);
    await bench.as('technician').get('/api/photos/..%2f..%2fetc%2fpasswd').expect(404);
  });

  test('sent twice with one key is kept once', async () => {
    await taken(upload(jpeg, 'photo.jpg', 'the-same-photo-again'));
    const again = await taken(upload(jpeg, 'photo.jpg', 'the-same-photo-again'));
    expect([again.photos.length, await rows(), kept().length]).toEqual([1, 1, 2]);
    const other = await twoHalves(200, 100).jpeg().toBuffer();
    expect((await upload(other, 'photo.jpg', 'the-same-photo-again')).status).toBe(422);
  });

  test('is removed with its files, by the revision that was seen', async () => {
    const photo = await added();
    const remove = (rev: number) => as('technician').delete(`/api/photos/${photo.id}`).set('If-Match', `"${rev}"`);
    expect((await remove(photo.rev + 1)).status).toBe(412);
    expect(kept()).toHaveLength(2);
    page = await taken(remove(photo.rev));
    expect([page.photos, kept(), await rows()]).toEqual([[], [], 0]);
    expect(page.events[0]!.text).toBe('photo removed');
    await bench.as('technician').get(`/api/photos/${photo.id}`).expect(404);
  });

  test('goes with a deleted repair and comes back with it', async () => {
    const photo = await added();
    await taken(shop.send(`repairs/${page.id}/delete`, { reason: 'Booked twice.' }, 'manager'));
    expect((await upload(jpeg)).status).toBe(409);
    expect(kept()).toHaveLength(2);
    page = await taken(shop.send(`repairs/${page.id}/restore`, {}, 'manager'));
    expect(page.photos.map(({ id }) => id)).toEqual([photo.id]);
    await bench.as('technician').get(`/api/photos/${photo.id}`).expect(200);
  });
});

describe('an upload that is no photo', () => {
  const noise = Buffer.from(Array.from({ length: 5000 }, (_, at) => (at * 7919) % 251));
  // The header of a 30,000 × 30,000 PNG over the body of a small one.
  const bomb = async () => {
    const png = await twoHalves().png().toBuffer();
    const { crc32 } = await import('node:zlib');
    png.writeUInt32BE(30_000, 16);
    png.writeUInt32BE(30_000, 20);
    png.writeUInt32BE(crc32(png.subarray(12, 29)), 29);
    return png;
  };
  const cases: [string, () => Promise<Buffer> | Buffer, number, RegExp][] = [
    ['an empty one', () => Buffer.alloc(0), 400, /empty\. Take the photo again/],
    ['binary rubbish named photo.jpg', () => noise, 415, /no photo\. Choose a JPEG, PNG or WebP/],
    ['a page named photo.jpg', () => Buffer.from('<script>alert(1)</script>'), 415, /no photo/],
    ['a drawing with scripts', () => Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'), 415, /no photo/],
    ['a PDF', () => Buffer.from('%PDF-1.7\n%abc\n1 0 obj'), 415, /no photo/],
    [
      'a phone’s own format',
      () => Buffer.from('000000186674797068656963000000006d696631', 'hex'),
      415,
      /most compatible/,
    ],
    ['half a photo', async () => (await placedPhoto()).subarray(0, 1200), 400, /damaged .* Take it again/],
    ['a picture of 900 million pixels', bomb, 413, /64 million pixels\. Take it at a lower resolution/],
    ['50 MB', () => Buffer.alloc(50 * 1024 * 1024, 1), 413, /larger than 16 MB/],
    [
      '17 MB that begin as a JPEG',
      () => Buffer.concat([jpeg, Buffer.alloc(17 * 1024 * 1024)]),
      413,
      /larger than 16 MB/,
    ],
  ];
  test.each(cases)(
    'is refused with what to change, and leaves neither file nor row: %s',
    async (_name, make, status, says) => {
      const answer = await upload(await make());
      expect([answer.status, answer.body.detail]).toEqual([status, expect.stringMatching(says)]);
      expect(Object.keys(answer.body.fields)).toEqual(['photo']);
      expect([kept(), await rows()]).toEqual([[], 0]);
      expect((await shop.seen(page.id)).rev).toBe(page.rev);
    },
  );

  test('is refused without a file, with two, and as JSON', async () => {
    const post = () => bench.as('technician').post(`/api/repairs/${page.id}/photos`).set('Idempotency-Key', key());
    expect((await post()).status).toBe(400);
    const cookie = bench.as('technician').cookie();
    const two = await request(bench.server.app)
      .post(`/api/repairs/${page.id}/photos`)
      .set({ Cookie: cookie, 'Idempotency-Key': key() })
      .attach('photo', jpeg, 'a.jpg')
      .attach('photo', jpeg, 'b.jpg');
    expect([two.status, two.body.detail]).toEqual([400, 'Send one file in a request, and nothing else.']);
    expect([kept(), await rows()]).toEqual([[], 0]);
  });

  test('leaves no file where the row cannot be written', async () => {
    await bench.server.deps.dataSource.query('DROP TABLE photo');
    await bench.server.deps.dataSource.query('CREATE TABLE photo (id varchar, workshop_id varchar, repair_id varchar)');
    expect((await upload(jpeg)).status).toBe(500);
    expect(kept()).toEqual([]);
  });
});

describe('what is seen on a photo', () => {
  test('is the condition of that module; a leak blocks the repair until it is recorded what became of the module', async () => {
    const photo = await added();
    page = await taken(note(photo, { seen: 'leak', modulePosition: '4', caption: 'Wet at the lower edge' }));
    expect(page.conditions).toEqual([
      expect.objectContaining({ modulePosition: '4', condition: 'leaking', photoId: photo.id, fate: null }),
    ]);
    expect(page.block).toMatchObject({ code: 'module-condition', role: null });
    expect(page.block!.text).toContain('Module 4 is leaking on a photo.');
    expect(page.events[0]!.text).toBe('photo of module 4: leak');
    const over = await shop.send(`repairs/${page.id}/hand-over`, { note: 'Customer in a hurry.' });
    expect([over.status, over.body.code]).toEqual([409, 'module_condition']);
    const removed = (fate: string, text: string) =>
      shop.send(`repairs/${page.id}/removed`, { modulePosition: '4', fate, note: text });
    expect((await removed('stock', 'tested')).body.fields.fate).toContain('is leaking on a photo and is no spare');
    expect((await removed('went-back-in', '')).status).toBe(400);
    page = await taken(removed('went-back-in', 'New module advised, customer declined'));
    expect([page.block, page.conditions[0]!.fate]).toEqual([null, 'went-back-in']);
    await taken(shop.send(`repairs/${page.id}/hand-over`, { note: 'As it is.' }));
  });

  test('of the failing module blocks nothing: it comes out anyway; a dent only warns', async () => {
    page = await shop.confirm(await shop.read(page.id, arrival));
    expect(page.failing).toBe('2');
    const photo = await added();
    page = await taken(note(photo, { seen: 'swelling', modulePosition: '2' }));
    expect([page.conditions[0]!.condition, page.block]).toEqual(['swollen', null]);
    page = await taken(note({ ...photo, rev: photo.rev + 1 }, { seen: 'damage', modulePosition: '1' }));
    expect([page.conditions.map(({ condition }) => condition), page.block]).toEqual([['dented'], null]);
  });

  test('of two photos of one module the worse one counts, and one that shows something is not removed', async () => {
    const first = await added();
    const second = await added();
    await taken(note(first, { seen: 'leak', modulePosition: '3' }));
    page = await taken(note(second, { seen: 'damage', modulePosition: '3' }));
    expect(page.conditions.map(({ condition, photoId }) => [condition, photoId])).toEqual([['leaking', first.id]]);
    const refused = await bench.as('technician').delete(`/api/photos/${first.id}`).set('If-Match', '"2"');
    expect([refused.status, refused.body.code, kept().length]).toEqual([409, 'photo_shows', 4]);
    expect((await note(first, { seen: 'none' })).status).toBe(412);
    page = await taken(note(first, { seen: 'none' }, 2));
    expect(page.conditions.map(({ condition }) => condition)).toEqual(['dented']);
  });

  test('needs a module that the pack has, and names one of two', async () => {
    const photo = await added();
    expect((await note(photo, { seen: 'leak' })).body.fields.modulePosition).toBe('Say on which module it was seen.');
    expect((await note(photo, { seen: 'leak', modulePosition: '9' })).body.fields.modulePosition).toBe(
      'This pack has no module 9. Type another.',
    );
    const spareId = await bench.spare('S-0417');
    expect((await note(photo, { seen: 'leak', spareId })).body.fields.spareId).toContain('not one of this repair');
    const other = bench.server.agentFor('manager', bench.server.other);
    const theirs = other.patch(`/api/photos/${photo.id}`, {
      caption: '',
      seen: 'none',
      modulePosition: '',
      spareId: null,
    });
    expect((await theirs.set('If-Match', '"1"')).status).toBe(404);
    expect((await shop.seen(page.id)).conditions).toEqual([]);
  });

  test('of the spare of this repair sets it aside with its condition; its waiting charge goes only where it was seen', async () => {
    const spareId = await bench.spare('S-0417');
    page = await shop.take(await shop.confirm(await shop.read(page.id, arrival)));
    page = await taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
    const charge = await shop.plan(page, spareId);
    const photo = await added();
    const blind = await note(photo, { seen: 'swelling', spareId });
    expect([blind.status, blind.body.code]).toEqual([409, 'spare_on_charge']);
    expect((await shop.seen(page.id)).photos[0]!.seen).toBe('none');
    page = await taken(note(photo, { seen: 'swelling', spareId, charge: { id: charge.id, rev: charge.rev } }));
    expect(page.photos[0]).toMatchObject({ seen: 'swelling', spare: { id: spareId, label: 'S-0417' } });
    expect([page.charge, page.conditions]).toEqual([null, []]);
    const spare = (await bench.as('technician').get(`/api/spares/${spareId}`)).body as SpareDto;
    expect(spare).toMatchObject({ where: 'quarantine', condition: 'swollen' });
    expect(spare.quarantine!.reason).toBe(`Swelling seen on a photo of ${page.number}.`);
    const after = (await bench.as('technician').get(`/api/charges/${charge.id}`)).body as { stage: string };
    expect(after.stage).toBe('stopped');
  });
});
