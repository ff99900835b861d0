import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * One narrow row of every charge that became ready, and an index by time over who held which channel. The rows of charges
 * of before are written at the first start (`fill-waits.ts`), because working hours decide what they hold.
 *
 * The table is kept in the order of its key: the waits of a workshop lie side by side, and a year of them is read without
 * jumping. Read in the order of the rows 200,000 waits of one of 50 workshops lie on as many pages.
 */
export class FinishedWaits1767110000000 implements MigrationInterface {
  readonly name = 'FinishedWaits1767110000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      `CREATE TABLE "finished_wait" (
        "workshop_id" varchar(36) NOT NULL,
        "ready_at" bigint NOT NULL,
        "charge_id" varchar(36) NOT NULL,
        "asked_at" bigint NOT NULL,
        "module_type_id" varchar(36) NOT NULL,
        "charger_id" varchar(36) NOT NULL,
        "channel_id" varchar(36) NOT NULL,
        "technician_id" varchar(36) NOT NULL,
        "way" varchar NOT NULL,
        "weekday" integer NOT NULL,
        "monday" varchar NOT NULL,
        "wait_ms" bigint NOT NULL,
        "used_ms" bigint NOT NULL,
        "lost_ms" bigint NOT NULL,
        "late_ms" bigint NOT NULL,
        "in_band" boolean NOT NULL,
        "queue_ms" bigint,
        "charging_ms" bigint,
        "tapering_ms" bigint,
        "resting_ms" bigint,
        "check_due_ms" bigint,
        "booked_at" bigint,
        "due_at" bigint,
        "held_from_at" bigint,
        "held_to_at" bigint,
        "from_volts" double precision,
        "to_volts" double precision,
        "group_ah" double precision,
        CONSTRAINT "fk_finished_wait_workshop" FOREIGN KEY ("workshop_id") REFERENCES "workshop" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
        CONSTRAINT "fk_finished_wait_charge" FOREIGN KEY ("charge_id") REFERENCES "charge" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
        PRIMARY KEY ("workshop_id", "ready_at", "charge_id")
      ) WITHOUT ROWID`,
    );
    await runner.query('CREATE UNIQUE INDEX "uq_finished_wait_charge" ON "finished_wait" ("charge_id")');
    await runner.query(
      `CREATE INDEX "ix_channel_hold_time" ON "channel_hold" ("workshop_id", "state", "to_at", "from_at", "channel_id")`,
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP INDEX "ix_channel_hold_time"');
    await runner.query('DROP TABLE "finished_wait"');
  }
}
