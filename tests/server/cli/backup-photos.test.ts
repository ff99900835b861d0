import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { backUp } from '@/server/back-up';
import { backUpPhotos } from '@/server/back-up-photos';
import { databaseFile, photoFolder } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { repairForm } from '@/tests/support/repaired';
import { twoHalves } from '@/tests/support/pictures';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let folder: string;
let server: TestServer;
beforeEach(async () => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-backup-photos-'));
  const dataSource = await makeDataSource(databaseFile(folder)).initialize();
  await dataSource.runMigrations();
  server = await makeTestServer({ config: { dataDir: folder }, deps: { dataSource } });
});
afterEach(async () => {
  await server.close();
  // The server of the tests closes the one it has made itself.
  await server.deps.dataSource.destroy();
  fs.rmSync(folder, { recursive: true, force: true });
});

const at = (day: number) => new Date(Date.UTC(2026, 5, day));
const pictures = (of: string) => fs.readdirSync(of).filter((name) => !name.includes('thumb'));
const saved = async (day: number) => {
  const backups = path.join(folder, 'backups');
  const file = await backUp(databaseFile(folder), backups, at(day));
  return { file, told: backUpPhotos(file, photoFolder(folder), path.join(backups, 'photos')), backups };
};

async function withPhotos() {
  const technician = server.agentFor('technician');
  const booked = await technician.post('/api/repairs', repairForm(null)).set('Idempotency-Key', 'book-for-backup');
  const photos: { id: string; rev: number }[] = [];
  for (const width of [40, 60]) {
    const answer = await technician
      .upload(`/api/repairs/${booked.body.id}/photos`, 'photo', await twoHalves(width, 20).jpeg().toBuffer(), 'a.jpg')
      .set('Idempotency-Key', `photo-of-${width}-px`)
      .expect(201);
    server.clock.advance(1);
    photos.push(answer.body.photos[0]);
  }
  return { technician, photos };
}

test('a restored copy serves the two photos it names, one of them removed since; the next copy takes only what is new', async () => {
  const { technician, photos } = await withPhotos();
  const before = await technician.get(`/api/photos/${photos[0]!.id}`).expect(200);
  const first = await saved(9);
  expect(first.told).toEqual({ there: 2, copied: 2, missing: [] });
  await technician.delete(`/api/photos/${photos[0]!.id}`).set('If-Match', '"1"').expect(200);
  const second = await saved(10);
  expect(second.told).toEqual({ there: 1, copied: 0, missing: [] });
  expect(pictures(path.join(first.backups, 'photos'))).toHaveLength(2);

  // As the README says it: the copy as bidewell.sqlite, the folder of photos beside it.
  const restored = path.join(folder, 'restored');
  fs.mkdirSync(restored);
  fs.copyFileSync(first.file, databaseFile(restored));
  fs.cpSync(path.join(first.backups, 'photos'), photoFolder(restored), { recursive: true });
  const dataSource = await makeDataSource(databaseFile(restored)).initialize();
  const again = await makeTestServer({ empty: true, config: { dataDir: restored }, deps: { dataSource } });
  again.clock.set(server.clock.now());
  for (const { id } of photos) {
    const answer = await again.agentFor('technician', server.own).get(`/api/photos/${id}`).expect(200);
    if (id === photos[0]!.id) expect((answer.body as Buffer).equals(before.body as Buffer)).toBe(true);
  }
  await again.close();
  await dataSource.destroy();
});

test('names a photo whose file is gone or damaged, and copies the other', async () => {
  await withPhotos();
  const [one] = pictures(photoFolder(folder));
  fs.writeFileSync(path.join(photoFolder(folder), one!), 'damaged');
  const { told, backups } = await saved(9);
  expect(told).toEqual({ there: 1, copied: 1, missing: [one] });
  const [kept] = pictures(path.join(backups, 'photos'));
  const row = (await server.deps.dataSource.query('SELECT sha256 FROM photo WHERE file = ?', [
    kept!.replace('.jpg', ''),
  ])) as { sha256: string }[];
  const bytes = fs.readFileSync(path.join(backups, 'photos', kept!));
  expect(createHash('sha256').update(bytes).digest('hex')).toBe(row[0]!.sha256);
});
