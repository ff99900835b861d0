import { Table, TableColumn, type MigrationInterface, type QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';
import { flag, idOf, instant, json, primary, table, text, whole } from './columns';

const columns = {
  workshop: {
    pass_on_tell_minutes: 'integer',
    pass_on_amber_minutes: 'integer',
    pass_on_alarm_minutes: 'integer',
  },
  alert: { for_role: 'varchar', pass_due_at: 'bigint' },
} as const;

const turn = table('alert_turn', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('alert_id'),
    whole('number'),
    text('audience'),
    idOf('person_id', 'optional'),
    idOf('passed_by_id', 'optional'),
    instant('from_at'),
    idOf('taken_by_id', 'optional'),
    instant('taken_at', 'optional'),
    instant('ended_at', 'optional'),
    text('ended_by', 'optional'),
  ],
  uniques: { uq_alert_turn: ['alert_id', 'number'] },
  indices: { ix_alert_turn_alert: ['workshop_id', 'alert_id'] },
  checks: {
    ck_alert_turn_audience: "audience IN ('person','everybody','foremen','managers')",
    ck_alert_turn_ended: "ended_by IN ('passed','not-taken','cleared')",
  },
  references: {
    workshop_id: 'workshop',
    alert_id: { table: 'alert', cascade: true },
    person_id: 'person',
    passed_by_id: 'person',
    taken_by_id: 'person',
  },
});

const outbox = table('outbox_entry', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('alert_id'),
    whole('turn'),
    idOf('person_id'),
    text('way'),
    text('state'),
    instant('due_at'),
    instant('leased_until', 'optional'),
    whole('tries'),
    json('reached'),
    json('tickets'),
    instant('receipt_due_at', 'optional'),
    instant('held_at', 'optional'),
    text('reason', 'optional'),
    instant('created_at'),
    instant('ended_at', 'optional'),
  ],
  uniques: { uq_outbox_entry: ['alert_id', 'turn', 'person_id', 'way'] },
  indices: {
    ix_outbox_due: ['state', 'due_at'],
    ix_outbox_receipt: ['receipt_due_at'],
    ix_outbox_state: ['workshop_id', 'state'],
  },
  checks: {
    ck_outbox_state: "state IN ('waiting','sent','dead','dropped')",
    ck_outbox_way: "way IN ('browser-push','phone-push','e-mail')",
  },
  references: { workshop_id: 'workshop', alert_id: { table: 'alert', cascade: true }, person_id: 'person' },
});

const device = table('push_device', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('person_id'),
    idOf('session_id'),
    text('kind'),
    text('address'),
    text('p256dh', 'optional'),
    text('auth', 'optional'),
    text('name'),
    instant('created_at'),
  ],
  uniques: { uq_push_device_address: ['address'] },
  indices: { ix_push_device_person: ['workshop_id', 'person_id'] },
  checks: { ck_push_device_kind: "kind IN ('browser','phone')" },
  references: {
    workshop_id: 'workshop',
    person_id: { table: 'person', cascade: true },
    session_id: { table: 'session', cascade: true },
  },
});

const setting = table('alert_setting', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('person_id'),
    json('wishes'),
    text('quiet_from', 'optional'),
    text('quiet_to', 'optional'),
    flag('alarms_break_through'),
    instant('changed_at'),
  ],
  uniques: { uq_alert_setting_person: ['person_id'] },
  references: { workshop_id: 'workshop', person_id: { table: 'person', cascade: true } },
});

const tables = [turn, outbox, device, setting];

/** Causes that were told as an odd reading and have a name of their own from here on. */
const named = ['no-current', 'too-warm'];

/** An id of a charge, with or without one: an alert can be about a wall. */
const chargeId = (isNullable: boolean): TableColumn =>
  new TableColumn({ name: 'charge_id', type: 'varchar', length: '36', isNullable });

/**
 * Alerts that go out of the house: the outbox, devices, settings, and with whom an alert was. An alert does not need a
 * charge any more: SQLite builds its table anew for that, which nothing refers to before this migration.
 */
export class AlertDelivery1767000000000 implements MigrationInterface {
  readonly name = 'AlertDelivery1767000000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.changeColumn('alert', 'charge_id', chargeId(true));
    await addColumns(runner, columns);
    await runner.query('ALTER TABLE alert ADD COLUMN wall_id varchar(36)');
    await runner.query('ALTER TABLE alert ADD COLUMN turn integer NOT NULL DEFAULT (0)');
    await runner.query('CREATE INDEX ix_alert_pass ON alert (pass_due_at)');
    await runner.query('CREATE INDEX ix_alert_wall ON alert (wall_id)');
    for (const one of tables) await runner.createTable(new Table(one));
    // The alerts of before get the turn that they are in, so that taking them is written down like any other.
    await runner.query(
      `INSERT INTO alert_turn (id, workshop_id, alert_id, number, audience, person_id, passed_by_id, from_at, taken_by_id,
         taken_at, ended_at, ended_by)
       SELECT 't-' || substr(id, 1, 34), workshop_id, id, 0, CASE WHEN person_id IS NULL THEN 'everybody' ELSE 'person' END,
         person_id, NULL, COALESCE(passed_at, raised_at), taken_by_id, taken_at, cleared_at,
         CASE WHEN cleared_at IS NULL THEN NULL ELSE 'cleared' END FROM alert`,
    );
    for (const kind of named)
      await runner.query(
        `UPDATE alert SET kind = '${kind}', cause = '${kind}' || substr(cause, length('odd-reading') + 1)
         WHERE kind = 'odd-reading' AND cause LIKE '%:${kind}'`,
      );
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const kind of named)
      await runner.query(
        `UPDATE alert SET kind = 'odd-reading', cause = 'odd-reading' || substr(cause, length('${kind}') + 1)
         WHERE kind = '${kind}'`,
      );
    for (const one of [...tables].reverse()) await runner.dropTable(one.name);
    await runner.query('DROP INDEX ix_alert_wall');
    await runner.query('DROP INDEX ix_alert_pass');
    await runner.query('DELETE FROM alert WHERE charge_id IS NULL');
    await runner.query('ALTER TABLE alert DROP COLUMN turn');
    await runner.query('ALTER TABLE alert DROP COLUMN wall_id');
    await dropColumns(runner, columns);
    await runner.changeColumn('alert', 'charge_id', chargeId(false));
  }
}
