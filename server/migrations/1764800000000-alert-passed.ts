import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * When an alert was passed on: for whom it is now it rings from then, not from when it was raised.
 *
 * Plain statements, which both databases have: the Table API would build the table anew on SQLite.
 */
export class AlertPassed1764800000000 implements MigrationInterface {
  readonly name = 'AlertPassed1764800000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE alert ADD COLUMN passed_at bigint');
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE alert DROP COLUMN passed_at');
  }
}
