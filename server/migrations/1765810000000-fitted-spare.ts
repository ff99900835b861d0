import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { idOf, instant, json, primary, real, table, text } from './columns';

const fitted = table('fitted_spare', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('repair_id'),
    idOf('spare_id'),
    text('module_position', 'optional'),
    json('group_volts'),
    real('target_volts'),
    real('tolerance_millivolts'),
    text('note', 'optional'),
    instant('at'),
    idOf('person_id'),
  ],
  indices: { ix_fitted_spare_repair: ['workshop_id', 'repair_id', 'at'] },
  references: {
    workshop_id: 'workshop',
    repair_id: { table: 'repair', cascade: true },
    spare_id: 'spare',
    person_id: 'person',
  },
});

/** Spares that were fitted without a charge. Until now none could be. */
export class FittedSpare1765810000000 implements MigrationInterface {
  readonly name = 'FittedSpare1765810000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(new Table(fitted));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable(fitted.name);
  }
}
