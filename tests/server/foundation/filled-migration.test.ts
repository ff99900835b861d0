import { afterAll, beforeAll, expect, test } from 'vitest';
import type { DataSource } from 'typeorm';
import { migrations } from '@/server/migrations/all';
import { hour, kept, makeBench, minute, running, type Bench } from '../charges/bench';

let bench: Bench;
let dataSource: DataSource;
beforeAll(async () => {
  bench = await makeBench();
  dataSource = bench.server.deps.dataSource;
  const charge = await running(bench, { spareId: await bench.spare('S-0001'), repairRef: 'R-1' });
  bench.server.clock.advance(5 * minute);
  await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/readings`, { amps: '10' })
    .set('Idempotency-Key', 'a-reading-to-keep');
  // A look-in falls due: an alert is open.
  await bench.live(hour + 10 * minute, 10 * minute);
  await bench.spare('S-0002');
  const joined = await kept(bench, { spareId: await bench.spare('S-0003'), repairRef: 'R-2' }, { channel: 'B1' });
  // A charge through a resistor as the version before wrote it: only the frozen plan names its neighbour.
  await dataSource.query(
    `UPDATE charge SET way = 'resistor', frozen = json_set(frozen, '$.neighbour', json('{"label":"S-0002"}')) WHERE id = ?`,
    [joined.id],
  );
});
afterAll(() => bench.server.close());

/** What the migrations since the first add. */
const comeAndGo = {
  tables: [
    'spare_capacity',
    ...['pack_type', 'repair', 'repair_person', 'pack_reading', 'second_source', 'removed_module', 'repair_wait'],
    ...['repair_event', 'advised_item', 'photo', 'fitted_spare'],
    ...['place', 'skill', 'staffing', 'work', 'work_stint', 'bench_change'],
    ...['alert_turn', 'outbox_entry', 'push_device', 'alert_setting'],
    'finished_wait',
    'weekly_digest',
    'digest_stop',
  ],
  columns: [
    ...['neighbour_spare_id', 'passed_at', 'early', 'capacity_sd_ah', 'taken_at_place'],
    ...['curve_id', 'own_curve', 'pulse_short_s', 'pulse_short_milliohm', 'pulse_longer_s', 'pulse_longer_milliohm'],
    ...['cold_current_percent', 'warm_current_percent', 'precharge_below_volts'],
    ...['display_step_amps', 'leads_measured', 'derating_above_celsius', 'derating_percent', 'duty_percent'],
    ...['technician_decides', 'repair_id'],
    ...['unattended_charges', 'look_in_visit_minutes', 'fit_minutes', 'usual_arrival_volts'],
    ...['pass_on_tell_minutes', 'pass_on_amber_minutes', 'pass_on_alarm_minutes'],
    ...['wall_id', 'for_role', 'pass_due_at', 'turn'],
  ],
};

/** Every row of every table but the columns that come and go. */
async function everything(): Promise<Record<string, unknown[]>> {
  const rows: Record<string, unknown[]> = {};
  for (const { tableName } of dataSource.entityMetadatas) {
    if (comeAndGo.tables.includes(tableName)) continue;
    const found = (await dataSource.query(`SELECT * FROM ${tableName} ORDER BY id`)) as Record<string, unknown>[];
    rows[tableName] = found.map((row) =>
      Object.fromEntries(Object.entries(row).filter(([column]) => !comeAndGo.columns.includes(column))),
    );
  }
  return rows;
}

test('the migrations since the first go down and up over a filled database without losing a row, and find the neighbours', async () => {
  const before = await everything();
  expect(before.charge).toHaveLength(2);
  expect(before.charge_event!.length).toBeGreaterThan(3);
  expect(before.alert!.length).toBeGreaterThan(0);
  for (const _one of migrations.slice(1)) {
    await dataSource.undoLastMigration();
    expect(await everything()).toEqual(before);
  }
  await dataSource.runMigrations();
  expect(await everything()).toEqual(before);
  expect((await dataSource.driver.createSchemaBuilder().log()).upQueries).toEqual([]);
  expect(await dataSource.query('PRAGMA foreign_key_check')).toEqual([]);
  expect(await dataSource.query('PRAGMA foreign_keys')).toEqual([{ foreign_keys: 1 }]);
  const found = (await dataSource.query(
    'SELECT c.repair_ref, s.label FROM charge c LEFT JOIN spare s ON s.id = c.neighbour_spare_id ORDER BY c.repair_ref',
  )) as unknown[];
  expect(found).toEqual([
    { repair_ref: 'R-1', label: null },
    { repair_ref: 'R-2', label: 'S-0002' },
  ]);
});
