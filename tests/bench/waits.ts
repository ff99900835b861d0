import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import Database from 'better-sqlite3';
import type { Logger } from 'typeorm';
import { makeDataSource } from '@/server/data-source';
import { Charge } from '@/server/entities/charge';
import { FinishedWait } from '@/server/entities/finished-wait';
import { workshopForPlans } from '@/server/repositories/workshop-for-plans.repository';
import { inTransaction } from '@/server/services/unit-of-work';
import { recordWaits } from '@/server/services/waits/record-waits';
import type { WaitsDto } from '@/shared/contract/waits';
import { pastChargeRow } from '../server/waits/history';
import { furnish, newKey, type Furnished } from '../support/furnished';
import { makeTestServer, testNow, type TestServer } from '../support/server';
import { benchReplay } from './replay';
import { bareAgain, databaseMs, timeStatements, type StatementTimes } from './write-path';

/** Of every 1,000 charges in the order of time: of the large workshop, of the measured one, and the rest of 48 others. */
const CHARGES = 1_000_000;
const LARGE = 200;
const OWN = 20;
const YEARS_MS = 2 * 365 * 86_400_000;
/** Of a charge's plan; the real ones are some thousand characters. */
const PLAN = JSON.stringify({ trace: Array.from({ length: 40 }, (_, at) => [at, 3.9]) });

interface Asked {
  sql: string;
  values: unknown[];
}

/** Hears every statement. */
function makeListener(): Logger & { heard: Asked[] } {
  const heard: Asked[] = [];
  const deaf = () => {};
  return {
    heard,
    logQuery: (sql, values) => void heard.push({ sql, values: (values as unknown[] | undefined) ?? [] }),
    ...{ logQueryError: deaf, logQuerySlow: deaf, logSchemaBuild: deaf, logMigration: deaf, log: deaf },
  };
}

/**
 * The waits of two workshops in a database of 1,000,000 finished charges of 50, lying between each other as they became
 * ready; over the API, against the same statements through bare better-sqlite3.
 */
export async function* benchWaits(): AsyncGenerator<string> {
  yield* await benchReplay();
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-bench-'));
  const file = path.join(folder, 'bench.db');
  const listener = makeListener();
  const dataSource = await makeDataSource(file, listener).initialize();
  try {
    await dataSource.runMigrations();
    const server = await makeTestServer({ deps: { dataSource } });
    const { own, other } = await furnish(server);
    const times = timeStatements(dataSource);
    const empty = await readings(server, own, times, file);
    const started = performance.now();
    await fill(server, own, other);
    const seconds = (performance.now() - started) / 1000;
    // Else the disk is still at it while writes are measured.
    const onDisk = fs.openSync(file, 'r+');
    fs.fsyncSync(onDisk);
    fs.closeSync(onDisk);
    const size = fs.statSync(file).size / 1e9;
    yield `${CHARGES} finished charges over 50 workshops: ${size.toFixed(1)} GB, filled in ${seconds.toFixed(0)} s`;
    const since = new Date(testNow - YEARS_MS - 86_400_000).toISOString().slice(0, 10);
    yield await page(server, listener, file, own, `from=${since}`, (CHARGES * OWN) / 1000, 150);
    yield await page(server, listener, file, other, `from=${since}`, (CHARGES * LARGE) / 1000, 1000);
    // Of the other workshop: its charge has as many readings as the first one had.
    const full = await readings(server, other, times, file);
    yield `a reading of a running charge, its ${full.statements} statements at the driver: ${readingText(full)}`;
    yield `the same in the empty database: ${readingText(empty)}`;
    yield `what the statistics write with a charge that becomes ready: ${(await writing(server, own)).toFixed(1)} ms (promised: 5 ms)`;
    await server.close();
  } finally {
    await dataSource.destroy();
    fs.rmSync(folder, { recursive: true, force: true });
  }
}

/** Multiplies one charge, with its hold and its narrow row. */
async function fill(server: TestServer, own: Furnished, other: Furnished): Promise<void> {
  const { dataSource } = server.deps;
  const { manager } = dataSource;
  const templates = [
    [own, 'own'],
    [other, 'other'],
  ] as const;
  for (const [place, [furnished, name]] of templates.entries())
    await manager.insert(Charge, {
      ...pastChargeRow({
        ...{ number: 9_000_000 + place, workshopId: furnished.workshop.id, spareId: furnished.spareId },
        ...{ typeId: furnished.typeId, personId: furnished.workshop.people.technician.id, channelIds: [] },
        ...{
          readyAt: testNow - YEARS_MS,
          waitMin: 100,
          queueMin: 10,
          taperMin: 10,
          restMin: 20,
          checkMin: 5,
          lateMin: 0,
        },
      }),
      id: `template-${name}`,
      number: `T-${name}`,
      option: JSON.parse(PLAN) as Charge['option'],
      frozen: JSON.parse(PLAN) as Charge['frozen'],
    });
  const run = (sql: string) => dataSource.query(sql);
  await run('PRAGMA foreign_keys = OFF');
  await run('PRAGMA synchronous = OFF');
  await run('PRAGMA cache_size = -2000000');
  await run(`CREATE TABLE bench_seq AS WITH RECURSIVE seq(i) AS (SELECT 0 UNION ALL SELECT i + 1 FROM seq WHERE i < ${CHARGES - 1})
    SELECT i, CASE WHEN i % 1000 < ${LARGE} THEN '${other.workshop.id}' WHEN i % 1000 < ${LARGE + OWN} THEN '${own.workshop.id}'
      ELSE 'workshop-' || (i % 48) END AS workshop_id,
      ${testNow - YEARS_MS} + i * ${Math.floor((YEARS_MS - 86_400_000) / CHARGES)} AS ready_at,
      (i * 7919) % 997 AS h, (i * 104729) % 991 AS g FROM seq`);
  const waitMs = '(600000 + h * 40000)';
  const template = `CASE WHEN s.workshop_id = '${own.workshop.id}' THEN 'template-own' ELSE 'template-other' END`;
  const columnsOf = (
    entity: typeof Charge | typeof FinishedWait,
    as: Record<string, string>,
    rest: (name: string) => string,
  ) => {
    const names = dataSource.getMetadata(entity).columns.map(({ databaseName }) => databaseName);
    return {
      names: names.map((name) => `"${name}"`).join(', '),
      values: names.map((name) => as[name] ?? rest(name)).join(', '),
    };
  };
  const charge = columnsOf(
    Charge,
    {
      ...{ id: "'charge-' || s.i", number: "'X-' || s.i", workshop_id: 's.workshop_id', ready_at: 's.ready_at' },
      ...{ created_at: `s.ready_at - ${waitMs}`, closed_at: 's.ready_at' },
    },
    (name) => `t."${name}"`,
  );
  await run(
    `INSERT INTO charge (${charge.names}) SELECT ${charge.values} FROM bench_seq s JOIN charge t ON t.id = ${template} ORDER BY s.i`,
  );
  const channel = `CASE WHEN workshop_id = '${own.workshop.id}' THEN '${own.channelId}' ELSE '${other.channelId}' END`;
  await run(`INSERT INTO channel_hold (id, workshop_id, charge_id, step_index, channel_id, state, from_at, to_at)
    SELECT 'hold-' || i, workshop_id, 'charge-' || i, 0, ${channel}, 'released', ready_at - ${waitMs} / 2, ready_at - ${waitMs} / 4 FROM bench_seq ORDER BY i`);
  const wait = columnsOf(
    FinishedWait,
    {
      ...{
        workshop_id: 'workshop_id',
        ready_at: 'ready_at',
        charge_id: "'charge-' || i",
        asked_at: `ready_at - ${waitMs}`,
      },
      module_type_id: `CASE WHEN g % 3 = 0 THEN '${own.typeId}' ELSE '${own.spareTypeId}' END`,
      ...{
        charger_id: `'${own.chargerId}'`,
        channel_id: channel,
        technician_id: `'${own.workshop.people.technician.id}'`,
      },
      ...{ way: "CASE WHEN g % 5 = 0 THEN 'paralleled' ELSE 'terminals' END" },
      weekday: "((strftime('%w', ready_at / 1000, 'unixepoch') + 6) % 7) + 1",
      monday: "date(ready_at / 1000, 'unixepoch', 'weekday 0', '-6 days')",
      ...{
        wait_ms: waitMs,
        used_ms: 'h * 1000',
        lost_ms: 'g * 30000',
        late_ms: '(g - 495) * 9000',
        in_band: 'g % 10 < 8',
      },
      ...{
        queue_ms: 'g * 1000',
        charging_ms: 'h * 30000',
        tapering_ms: 'CASE WHEN h % 3 = 0 THEN NULL ELSE g * 900 END',
      },
      ...{ resting_ms: '3600000', check_due_ms: 'g * 100', from_volts: '3.7', to_volts: '3.9', group_ah: '60.0' },
    },
    () => 'NULL',
  );
  await run(`INSERT INTO finished_wait (${wait.names}) SELECT ${wait.values} FROM bench_seq ORDER BY i`);
  await run('DROP TABLE bench_seq');
  // As better-sqlite3 has it.
  await run('PRAGMA cache_size = -16000');
  await run('PRAGMA synchronous = FULL');
  await run('PRAGMA foreign_keys = ON');
  await run('PRAGMA wal_checkpoint(TRUNCATE)');
}

/** The page's answer, and the statements it made through the bare driver. */
async function page(
  server: TestServer,
  listener: { heard: Asked[] },
  file: string,
  of: Furnished,
  query: string,
  charges: number,
  promisedMs: number,
): Promise<string> {
  const agent = server.agentFor('manager', of.workshop);
  const ask = async (): Promise<number> => {
    const started = performance.now();
    const { body } = await agent.get(`/api/waits?${query}`).expect(200);
    const ms = performance.now() - started;
    if ((body as WaitsDto).charges !== charges)
      throw new Error(`${(body as WaitsDto).charges} in place of ${charges}.`);
    return ms;
  };
  await ask();
  listener.heard.length = 0;
  await ask();
  const statements = listener.heard.filter(({ sql }) => /^\s*SELECT/i.test(sql));
  const bare = new Database(file, { readonly: true });
  const again = (): number => {
    const started = performance.now();
    for (const { sql, values } of statements) bare.prepare(sql).all(...(values as never[]));
    return performance.now() - started;
  };
  again();
  // By turns, so that what else the machine does is the same for both.
  const times: { api: number; bare: number }[] = [];
  for (let turn = 0; turn < 7; turn += 1) times.push({ api: await ask(), bare: again() });
  bare.close();
  const least = (of_: 'api' | 'bare') => Math.min(...times.map((one) => one[of_]));
  return `waits of ${charges} charges: ${least('api').toFixed(0)} ms over the API (promised: ${promisedMs} ms), the same ${statements.length} statements through bare better-sqlite3 ${least('bare').toFixed(0)} ms: ${(least('api') / least('bare')).toFixed(2)} times (promised: 1.5)`;
}

interface ReadingMs {
  statements: number;
  /** Over the API, with all its reckoning. */
  api: number;
  /** Of it what the database took, its writes and its commit. */
  database: number;
  writes: number;
  commit: number;
  /** The same statements through bare better-sqlite3, as durable. */
  bare: number;
  bareCommit: number;
}

const readingText = (ms: ReadingMs): string =>
  `${ms.database.toFixed(1)} ms (promised: 5 ms), of which its writes ${ms.writes.toFixed(1)} ms and the disk's commits ${ms.commit.toFixed(1)} ms; bare better-sqlite3 ${ms.bare.toFixed(1)} ms with a commit of ${ms.bareCommit.toFixed(1)} ms; over the API with all its reckoning ${ms.api.toFixed(1)} ms`;

const middle = (times: readonly number[]): number => [...times].sort((one, other) => one - other)[times.length >> 1]!;

/** Milliseconds of a reading of a charge that runs: the middle ones of 40. */
async function readings(
  server: TestServer,
  { workshop, chargeId }: Furnished,
  times: StatementTimes,
  file: string,
): Promise<ReadingMs> {
  const technician = server.agentFor('technician', workshop);
  const api: number[] = [];
  const acts: StatementTimes['heard'][] = [];
  for (let place = 0; place < 40; place += 1) {
    server.clock.advance(20_000);
    times.heard = [];
    const started = performance.now();
    await technician
      .post(`/api/charges/${chargeId}/readings`, { terminalVolts: '7.6', amps: '20', celsius: '22' })
      .set('Idempotency-Key', newKey())
      .expect(200);
    api.push(performance.now() - started);
    acts.push(times.heard);
  }
  const own = acts.map(databaseMs);
  const again = bareAgain(file, acts);
  return {
    statements: middle(own.map(({ statements }) => statements)),
    api: middle(api),
    database: middle(own.map(({ all }) => all)),
    writes: middle(own.map(({ writes }) => writes)),
    commit: middle(own.map(({ commit }) => commit)),
    bare: middle(again.map(({ all }) => all)),
    bareCommit: middle(again.map(({ commit }) => commit)),
  };
}

/** Milliseconds of writing a charge down, in a transaction of its own: the middle one of 40. */
async function writing({ deps }: TestServer, { workshop }: Furnished): Promise<number> {
  const shop = await workshopForPlans(deps.dataSource.manager, workshop.id);
  const times: number[] = [];
  for (let place = 0; place < 40; place += 1) {
    // Of those of this workshop, spread over the two years.
    const charge = { id: `charge-${place * 20_000 + LARGE}`, readyAt: 1 };
    const started = performance.now();
    await inTransaction(deps, (manager) => recordWaits(manager, shop, [charge]));
    times.push(performance.now() - started);
  }
  return times.sort((one, other) => one - other)[20]!;
}
