import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { idOf, instant, primary, table, text, whole } from './columns';

const photo = table('photo', {
  columns: [
    primary(),
    idOf('workshop_id'),
    idOf('repair_id'),
    text('file'),
    whole('width'),
    whole('height'),
    whole('bytes'),
    text('sha256'),
    text('caption', 'optional'),
    text('seen'),
    text('module_position', 'optional'),
    idOf('spare_id', 'optional'),
    instant('at'),
    idOf('person_id'),
    whole('rev'),
  ],
  uniques: { uq_photo_file: ['file'] },
  indices: { ix_photo_repair: ['workshop_id', 'repair_id', 'at'] },
  checks: { ck_photo_seen: "seen IN ('none','swelling','leak','damage')" },
  references: {
    workshop_id: 'workshop',
    repair_id: { table: 'repair', cascade: true },
    spare_id: 'spare',
    person_id: 'person',
  },
});

/** Photos of repairs; their files lie in the data folder. */
export class Photos1765550000000 implements MigrationInterface {
  readonly name = 'Photos1765550000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(new Table(photo));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable(photo.name);
  }
}
