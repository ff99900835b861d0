import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';
import { flag, idOf, instant, json, primary, table, text, whole } from './columns';

const columns = {
  workshop: { unattended_charges: 'boolean', look_in_visit_minutes: 'integer', fit_minutes: 'integer' },
  pack_type: { usual_arrival_volts: 'double precision' },
} as const;

const place = table('place', {
  columns: [
    primary(),
    idOf('workshop_id'),
    text('name'),
    text('kind'),
    instant('retired_at', 'optional'),
    whole('rev'),
  ],
  partial: { uq_place_name: { columns: ['workshop_id', 'name'], where: 'retired_at IS NULL' } },
  checks: { ck_place_kind: "kind IN ('bay','bench')" },
  references: { workshop_id: 'workshop' },
});

const skill = table('skill', {
  columns: [primary(), idOf('workshop_id'), text('name'), instant('retired_at', 'optional'), whole('rev')],
  partial: { uq_skill_name: { columns: ['workshop_id', 'name'], where: 'retired_at IS NULL' } },
  references: { workshop_id: 'workshop' },
});

const staffing = table('staffing', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('person_id'),
    json('hours', 'optional'),
    json('breaks'),
    json('days_off'),
    json('skill_ids'),
    whole('rev'),
  ],
  uniques: { uq_staffing_person: ['person_id'] },
  references: { workshop_id: 'workshop', person_id: 'person' },
});

const work = table('work', {
  columns: [
    primary(),
    idOf('workshop_id'),
    text('number'),
    text('title'),
    whole('likely_minutes'),
    whole('long_minutes'),
    idOf('skill_id', 'optional'),
    idOf('place_id', 'optional'),
    text('priority'),
    instant('due_at', 'optional'),
    idOf('repair_id', 'optional'),
    flag('splittable'),
    text('note', 'optional'),
    whole('left_minutes'),
    whole('left_long_minutes'),
    instant('over_at', 'optional'),
    idOf('over_by_id', 'optional'),
    text('drop_reason', 'optional'),
    idOf('created_by_id'),
    instant('created_at'),
    whole('rev'),
  ],
  uniques: { uq_work_number: ['workshop_id', 'number'] },
  indices: { ix_work_open: ['workshop_id', 'over_at'], ix_work_repair: ['workshop_id', 'repair_id'] },
  checks: { ck_work_priority: "priority IN ('low','usual','high','urgent')" },
  references: {
    workshop_id: 'workshop',
    skill_id: 'skill',
    place_id: 'place',
    repair_id: 'repair',
    over_by_id: 'person',
    created_by_id: 'person',
  },
});

const stint = table('work_stint', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('work_id'),
    idOf('person_id'),
    idOf('given_by_id', 'optional'),
    idOf('place_id', 'optional'),
    text('state'),
    instant('from_at'),
    instant('to_at'),
    whole('likely_minutes'),
    whole('long_minutes'),
    instant('begun_at', 'optional'),
    instant('ended_at', 'optional'),
    idOf('wait_charge_id', 'optional'),
  ],
  indices: {
    ix_work_stint_work: ['workshop_id', 'work_id'],
    ix_work_stint_person: ['workshop_id', 'person_id', 'from_at'],
    ix_work_stint_time: ['workshop_id', 'to_at'],
  },
  partial: { uq_work_stint_begun: { columns: ['person_id'], where: "state = 'begun'" } },
  checks: { ck_work_stint_state: "state IN ('taken','begun','done','given-back')" },
  references: {
    workshop_id: 'workshop',
    work_id: { table: 'work', cascade: true },
    person_id: 'person',
    given_by_id: 'person',
    place_id: 'place',
  },
});

const change = table('bench_change', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('person_id'),
    text('text'),
    json('moved'),
    instant('at'),
    instant('undone_at', 'optional'),
  ],
  indices: { ix_bench_change_at: ['workshop_id', 'at'] },
  references: { workshop_id: 'workshop', person_id: 'person' },
});

const tables = [place, skill, staffing, work, stint, change];

/** People's hours and skills, places, other work and the changes of the bench plan. Workshops of before have none. */
export class BenchPlan1765900000000 implements MigrationInterface {
  readonly name = 'BenchPlan1765900000000';

  async up(runner: QueryRunner): Promise<void> {
    await addColumns(runner, columns);
    for (const one of tables) await runner.createTable(new Table(one));
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const one of [...tables].reverse()) await runner.dropTable(one.name);
    await dropColumns(runner, columns);
  }
}
