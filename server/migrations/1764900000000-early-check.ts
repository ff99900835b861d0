import type { MigrationInterface, QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';

const columns = { rest_check: { early: 'boolean' } } as const;

/** Whether a check came before the minimum rest was over. Empty for the checks of before: nobody noted it. */
export class EarlyCheck1764900000000 implements MigrationInterface {
  readonly name = 'EarlyCheck1764900000000';

  up(runner: QueryRunner): Promise<void> {
    return addColumns(runner, columns);
  }

  down(runner: QueryRunner): Promise<void> {
    return dropColumns(runner, columns);
  }
}
