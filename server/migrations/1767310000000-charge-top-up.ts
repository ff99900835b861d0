import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Every act on a charge asks whether another went on from it; without this it read all charges of the workshop. */
export class ChargeTopUp1767310000000 implements MigrationInterface {
  name = 'ChargeTopUp1767310000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      'CREATE INDEX "ix_charge_top_up" ON "charge" ("workshop_id", "top_up_of") WHERE top_up_of IS NOT NULL',
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP INDEX "ix_charge_top_up"');
  }
}
