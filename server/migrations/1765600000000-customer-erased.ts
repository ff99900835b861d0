import type { MigrationInterface, QueryRunner } from 'typeorm';

/** When a customer's name and contact were erased from a repair, by whom and why. Plain statements, as `add-columns.ts` says. */
export class CustomerErased1765600000000 implements MigrationInterface {
  readonly name = 'CustomerErased1765600000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE repair ADD COLUMN erased_at bigint');
    await runner.query('ALTER TABLE repair ADD COLUMN erased_by_id varchar(36)');
    await runner.query('ALTER TABLE repair ADD COLUMN erase_reason varchar');
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const column of ['erase_reason', 'erased_by_id', 'erased_at'])
      await runner.query(`ALTER TABLE repair DROP COLUMN ${column}`);
  }
}
