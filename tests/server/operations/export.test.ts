import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import Papa from 'papaparse';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { exportedTables } from '@/server/services/workshop-export';
import { bytesOf } from '@/tests/support/bytes';
import { twoHalves } from '@/tests/support/pictures';
import { repairForm } from '@/tests/support/repaired';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let server: TestServer;
let folder: string;
let photoId: string;
beforeAll(async () => {
  server = await makeTestServer();
  const technician = server.agentFor('technician');
  const form = { ...repairForm(null), vehicle: '=Grey van, "old"', customerName: 'Ana' };
  const booked = await technician.post('/api/repairs', form).set('Idempotency-Key', 'book-to-export').expect(201);
  const photo = await technician
    .upload(`/api/repairs/${booked.body.id}/photos`, 'photo', await twoHalves(40, 20).jpeg().toBuffer(), 'a.jpg')
    .set('Idempotency-Key', 'a-photo-to-export');
  photoId = photo.body.photos[0].id;
  const theirs = server.agentFor('technician', server.other);
  await theirs
    .post('/api/repairs', { ...repairForm(null), vehicle: 'Of the other workshop' })
    .set('Idempotency-Key', 'book-elsewhere')
    .expect(201);
  const { bytes, headers } = await bytesOf(server.agentFor('manager').get('/api/export.zip'));
  expect(headers['content-disposition']).toBe('attachment; filename=bidewell-2026-06-09.zip');
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-export-'));
  fs.writeFileSync(path.join(folder, 'all.zip'), bytes);
  // Another reader of the format than the one that wrote it.
  execFileSync('python3', ['-m', 'zipfile', '-e', 'all.zip', '.'], { cwd: folder });
});
afterAll(async () => {
  await server.close();
  fs.rmSync(folder, { recursive: true, force: true });
});

const json = (table: string) =>
  JSON.parse(fs.readFileSync(path.join(folder, 'data', `${table}.json`), 'utf8')) as Record<string, unknown>[];
const everyText = () =>
  ['data', 'csv'].flatMap((part) =>
    fs.readdirSync(path.join(folder, part)).map((name) => fs.readFileSync(path.join(folder, part, name), 'utf8')),
  );

test('every table of the workshop is there twice, with as many rows as the database has of it', async () => {
  const tables = exportedTables(server.deps.dataSource);
  expect(tables.length).toBeGreaterThan(30);
  for (const { name, where } of tables) {
    const [row] = (await server.deps.dataSource.query(`SELECT count(*) AS n FROM "${name}" WHERE "${where}" = ?`, [
      server.own.id,
    ])) as { n: number }[];
    const csv = fs.readFileSync(path.join(folder, 'csv', `${name}.csv`), 'utf8');
    expect([name, json(name).length]).toEqual([name, row!.n]);
    expect([name, Papa.parse(csv.trim(), { header: true }).data.length]).toEqual([name, row!.n]);
  }
  expect(json('repair')).toHaveLength(1);
});

test('values read as they were typed: text with commas and quotes, instants, lists; a formula does not run', () => {
  expect(json('repair')[0]).toMatchObject({ vehicle: '=Grey van, "old"', created_at: '2026-06-09T08:00:00.000Z' });
  expect(json('workshop')[0]!.working_hours).toHaveLength(7);
  const csv = fs.readFileSync(path.join(folder, 'csv', 'repair.csv'), 'utf8');
  const [row] = Papa.parse<Record<string, string>>(csv.replace('\ufeff', '').trim(), { header: true }).data;
  expect(row!.vehicle).toBe('\'=Grey van, "old"');
});

test('the photo is the one that the app shows', async () => {
  const shown = await server.agentFor('technician').get(`/api/photos/${photoId}`).expect(200);
  const [name] = fs.readdirSync(path.join(folder, 'photos'));
  expect(fs.readFileSync(path.join(folder, 'photos', name!)).equals(shown.body as Buffer)).toBe(true);
});

test('nothing of the other workshop is in it, no hash and no token', async () => {
  const texts = everyText();
  const people = (await server.deps.dataSource.query('SELECT password_hash FROM person')) as {
    password_hash: string;
  }[];
  const sessions = (await server.deps.dataSource.query('SELECT token_hash FROM session')) as { token_hash: string }[];
  const never = [
    ...people.map((one) => one.password_hash),
    ...sessions.map((one) => one.token_hash),
    ...['workshop-other', 'Of the other workshop', 'book-to-export'],
  ];
  for (const word of never) expect([word, texts.some((text) => text.includes(word))]).toEqual([word, false]);
  await server.agentFor('foreman').get('/api/export.zip').expect(403);
});
