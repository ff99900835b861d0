/** Everything a workshop has, to take with it: every row of its tables as JSON and as CSV, and its photos. */
import Database from 'better-sqlite3';
import fs from 'node:fs';
import path from 'node:path';
import { PassThrough, Readable } from 'node:stream';
import { DateTime } from 'luxon';
import type { DataSource } from 'typeorm';
import { ZipFile } from 'yazl';
import { photoFolder } from '../data-files';
import type { Deps, Member } from '../deps';
import { findWorkshop } from '../repositories/workshops.repository';
import { csvBegin, csvLines, type CsvCell } from './csv';

/** Rows between two looks at other requests. */
const ROWS_AT_ONCE = 500;

/**
 * Of sessions, pairings, devices and sendings: keys that open something, and nothing that anybody has measured or done. The
 * rows of the statistics follow from those of charges, repairs and work, and digests from them.
 */
const leftOutTables: ReadonlySet<string> = new Set([
  'session',
  'invitation',
  'wall_code',
  'idempotency_key',
  'push_device',
  'finished_wait',
  'weekly_digest',
  'digest_stop',
]);
/** Columns that open something in whatever table. */
const leftOutColumn = /password|token|secret|successor|p256dh|^auth$|_key$/;

interface ExportedTable {
  name: string;
  columns: { name: string; json: boolean; flag: boolean; instant: boolean }[];
  where: string;
}

/** The tables that hold rows of a workshop, without what is left out. */
export function exportedTables(dataSource: DataSource): ExportedTable[] {
  return dataSource.entityMetadatas
    .filter(({ tableName }) => !leftOutTables.has(tableName))
    .flatMap((entity): ExportedTable[] => {
      const key = entity.tableName === 'workshop' ? 'id' : 'workshop_id';
      if (!entity.columns.some(({ databaseName }) => databaseName === key)) return [];
      const columns = entity.columns
        .filter(({ databaseName }) => !leftOutColumn.test(databaseName))
        .map((column) => ({
          name: column.databaseName,
          // The one transformer of text columns is that of JSON.
          json: column.type === 'text' && column.transformer !== undefined,
          flag: column.type === 'boolean',
          instant: column.type === 'bigint',
        }));
      return [{ name: entity.tableName, columns, where: key }];
    })
    .sort((one, other) => one.name.localeCompare(other.name));
}

type Row = Record<string, unknown>;

/** One moment of the database: what others write meanwhile is not seen. */
function snapshot(dataSource: DataSource): Database.Database {
  const file = String(dataSource.options.database);
  // One in memory has no file to be opened a second time.
  const database =
    file === ':memory:'
      ? new Database(
          (dataSource.driver as unknown as { databaseConnection: Database.Database }).databaseConnection.serialize(),
        )
      : new Database(file, { readonly: true, fileMustExist: true });
  database.exec('BEGIN');
  return database;
}

async function* rowsOf(database: Database.Database, table: ExportedTable, workshopId: string): AsyncGenerator<Row[]> {
  const names = table.columns.map(({ name }) => `"${name}"`).join(', ');
  const page = database.prepare(
    `SELECT rowid AS "#", ${names} FROM "${table.name}" WHERE "${table.where}" = ? AND rowid > ? ORDER BY rowid LIMIT ${ROWS_AT_ONCE}`,
  );
  for (let after = 0; ;) {
    const rows = page.all(workshopId, after) as (Row & { '#': number })[];
    if (rows.length > 0) yield rows;
    if (rows.length < ROWS_AT_ONCE) return;
    after = rows.at(-1)!['#'];
    // The statement is not asynchronous: others get their turn between two pages.
    await new Promise((resolve) => setImmediate(resolve));
  }
}

const asJson = (table: ExportedTable, row: Row): Row =>
  Object.fromEntries(
    table.columns.map(({ name, json, flag, instant }) => {
      const value = row[name] ?? null;
      if (value === null) return [name, null];
      if (json) return [name, JSON.parse(String(value)) as unknown];
      if (flag) return [name, value === 1];
      return [name, instant ? new Date(Number(value)).toISOString() : value];
    }),
  );

async function* jsonOf(pages: AsyncGenerator<Row[]>, table: ExportedTable): AsyncGenerator<string> {
  yield '[';
  let first = true;
  for await (const rows of pages) {
    yield rows.map((row, at) => `${first && at === 0 ? '\n' : ',\n'}${JSON.stringify(asJson(table, row))}`).join('');
    first = false;
  }
  yield '\n]\n';
}

async function* csvOf(pages: AsyncGenerator<Row[]>, table: ExportedTable): AsyncGenerator<string> {
  yield csvBegin + csvLines([table.columns.map(({ name }) => name)]);
  for await (const rows of pages)
    yield csvLines(
      rows.map((row) =>
        table.columns.map(({ name, instant }): CsvCell => {
          const value = row[name] ?? null;
          if (value === null) return null;
          if (instant) return new Date(Number(value)).toISOString();
          return typeof value === 'number' ? value : String(value);
        }),
      ),
    );
}

const readMe = (name: string, at: string): string =>
  `${name}, everything as it was at ${at}.\r\n\r\n` +
  'data/    every table as JSON, a row an object; instants in ISO 8601, UTC\r\n' +
  'csv/     the same rows for a spreadsheet: UTF-8, comma, a header line\r\n' +
  'photos/  the photos of repairs; "file" in the table photo names them\r\n\r\n' +
  'Passwords, sessions and keys are left out. Personal data of customers and people is in it: keep it as you keep that.\r\n';

/**
 * A ZIP of everything the workshop has, of one moment, written as it is read.
 * @returns the name of the file and its bytes; ending the stream early lets go of the database
 */
export async function exportWorkshop(
  deps: Pick<Deps, 'dataSource' | 'config'>,
  member: Pick<Member, 'workshopId'>,
  now: number,
): Promise<{ name: string; bytes: Readable }> {
  const { workshopId } = member;
  const workshop = await findWorkshop(deps.dataSource.manager, workshopId);
  const zone = workshop?.zone ?? 'UTC';
  const database = snapshot(deps.dataSource);
  const zip = new ZipFile();
  const add = (name: string, make: () => AsyncGenerator<string>): void =>
    zip.addReadStreamLazy(name, {}, (opened) => opened(null, Readable.from(make())));
  zip.addBuffer(Buffer.from(readMe(workshop?.name ?? '', new Date(now).toISOString())), 'README.txt');
  for (const table of exportedTables(deps.dataSource)) {
    add(`data/${table.name}.json`, () => jsonOf(rowsOf(database, table, workshopId), table));
    add(`csv/${table.name}.csv`, () => csvOf(rowsOf(database, table, workshopId), table));
  }
  const photos = database.prepare('SELECT file FROM photo WHERE workshop_id = ?').all(workshopId) as { file: string }[];
  for (const { file } of photos) {
    const picture = path.join(photoFolder(deps.config.dataDir), `${file}.jpg`);
    // Gone from the disk: the rest is worth having; the backup's check names it.
    if (fs.existsSync(picture)) zip.addFile(picture, `photos/${file}.jpg`, { compress: false });
  }
  zip.end();
  const bytes = new PassThrough();
  zip.outputStream.on('error', (error) => bytes.destroy(error));
  zip.outputStream.pipe(bytes);
  bytes.once('close', () => database.close());
  const day = DateTime.fromMillis(now, { zone }).toFormat('yyyy-MM-dd');
  return { name: `bidewell-${day}.zip`, bytes };
}
