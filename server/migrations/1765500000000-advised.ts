import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { idOf, instant, primary, table, text } from './columns';

const advised = table('advised_item', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('repair_id'),
    text('text'),
    text('outcome'),
    text('detail', 'optional'),
    text('agreed_by', 'optional'),
    instant('agreed_at', 'optional'),
    instant('at'),
    idOf('person_id'),
  ],
  indices: { ix_advised_item_repair: ['workshop_id', 'repair_id', 'at'] },
  checks: { ck_advised_item_outcome: "outcome IN ('open','done','booked','declined')" },
  references: { workshop_id: 'workshop', repair_id: { table: 'repair', cascade: true }, person_id: 'person' },
});

/** What was advised with a repair, and what the customer said to it. Repairs of before have nothing of it. */
export class Advised1765500000000 implements MigrationInterface {
  readonly name = 'Advised1765500000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(new Table(advised));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable(advised.name);
  }
}
