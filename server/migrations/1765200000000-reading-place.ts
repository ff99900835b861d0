import type { MigrationInterface, QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';

const columns = { charge_reading: { taken_at_place: 'varchar' } } as const;

/** Where a reading was taken. Empty for those of before: nobody has said. */
export class ReadingPlace1765200000000 implements MigrationInterface {
  readonly name = 'ReadingPlace1765200000000';

  up(runner: QueryRunner): Promise<void> {
    return addColumns(runner, columns);
  }

  down(runner: QueryRunner): Promise<void> {
    return dropColumns(runner, columns);
  }
}
