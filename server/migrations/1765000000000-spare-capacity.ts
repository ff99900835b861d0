import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';
import { idOf, instant, primary, real, table, text } from './columns';

const columns = { spare: { capacity_sd_ah: 'double precision' } } as const;

const capacities = table('spare_capacity', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('spare_id'),
    real('amp_hours'),
    real('sd_ah'),
    text('source'),
    text('state'),
    real('apart', 'optional'),
    idOf('charge_id', 'optional'),
    instant('at'),
    idOf('person_id'),
  ],
  indices: { ix_spare_capacity_spare: ['workshop_id', 'spare_id', 'at'] },
  references: {
    workshop_id: 'workshop',
    spare_id: 'spare',
    charge_id: { table: 'charge', cascade: true },
    person_id: 'person',
  },
});

/** What is known of a spare's capacity, and how well. */
export class SpareCapacity1765000000000 implements MigrationInterface {
  readonly name = 'SpareCapacity1765000000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(new Table(capacities));
    await addColumns(runner, columns);
  }

  async down(runner: QueryRunner): Promise<void> {
    await dropColumns(runner, columns);
    await runner.dropTable(capacities.name);
  }
}
