import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { Photo } from '@/server/entities/photo';
import { sweepPhotos } from '@/server/sweep-photos';
import { twoHalves } from '@/tests/support/pictures';
import { key, makeBench, type Bench } from '../charges/bench';
import { makeShop, taken, type Shop } from './shop';

let folder: string;
let bench: Bench;
let shop: Shop;
beforeEach(async () => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-sweep-'));
  bench = await makeBench({ config: { dataDir: folder } });
  shop = makeShop(bench);
});
afterEach(async () => {
  await bench.server.close();
  fs.rmSync(folder, { recursive: true, force: true });
});

const photos = (): string[] => fs.readdirSync(path.join(folder, 'photos')).sort();
const lay = (name: string, ageMinutes: number): void => {
  const at = path.join(folder, 'photos', name);
  fs.mkdirSync(path.dirname(at), { recursive: true });
  fs.writeFileSync(at, 'picture');
  const then = new Date(bench.server.clock.now() - ageMinutes * 60_000);
  fs.utimesSync(at, then, then);
};
const sweep = () => sweepPhotos(bench.server.deps.dataSource, folder, bench.server.clock.now());
const [one, other] = ['a'.repeat(32), 'b'.repeat(32)];

async function addPhoto(): Promise<string> {
  const { id } = await shop.book();
  const jpeg = await twoHalves().jpeg().toBuffer();
  const upload = bench.as('technician').upload(`/api/repairs/${id}/photos`, 'photo', jpeg, 'p.jpg');
  const page = await taken(upload.set('Idempotency-Key', key()));
  const { file } = await bench.server.deps.dataSource.manager.findOneByOrFail(Photo, { id: page.photos[0]!.id });
  const old = new Date(bench.server.clock.now() - 30 * 24 * 3_600_000);
  for (const name of photos()) fs.utimesSync(path.join(folder, 'photos', name), old, old);
  return file;
}

test('removes what no row names after 61 minutes, keeps what one names for a month, and what is 59 minutes old', async () => {
  const file = await addPhoto();
  lay(`${one}.jpg`, 61);
  lay(`${one}.thumb.jpg`, 61);
  lay(`${other}.jpg`, 59);
  // Nothing but a photo's own files is touched, however old.
  lay('notes.txt', 9999);
  lay(`${one}.jpg.bak`, 9999);
  expect(await sweep()).toEqual({ removed: [`${one}.jpg`, `${one}.thumb.jpg`], strange: false });
  expect(photos()).toEqual([`${one}.jpg.bak`, `${other}.jpg`, `${file}.jpg`, `${file}.thumb.jpg`, 'notes.txt'].sort());
});

test('touches nothing where the database names none of several photos: it was begun anew beside them', async () => {
  lay(`${one}.jpg`, 9999);
  lay(`${other}.jpg`, 9999);
  expect(await sweep()).toEqual({ removed: [], strange: true });
  expect(photos()).toHaveLength(2);
});

test('has nothing to do in a folder without photos', async () => {
  expect(await sweep()).toEqual({ removed: [], strange: false });
});
