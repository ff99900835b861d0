import type { MigrationInterface, QueryRunner } from 'typeorm';

/** The weekly digest of the waits, one row a week and manager, and who wants none. */
export class WeeklyDigest1767200000000 implements MigrationInterface {
  readonly name = 'WeeklyDigest1767200000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      `CREATE TABLE "weekly_digest" (
        "id" varchar(36) PRIMARY KEY NOT NULL,
        "workshop_id" varchar(36) NOT NULL,
        "person_id" varchar(36) NOT NULL,
        "monday" varchar NOT NULL,
        "words" text NOT NULL,
        "state" varchar NOT NULL,
        "due_at" bigint NOT NULL,
        "tries" integer NOT NULL,
        "reason" varchar,
        "created_at" bigint NOT NULL,
        "ended_at" bigint,
        CONSTRAINT "uq_weekly_digest" UNIQUE ("person_id", "monday"),
        CONSTRAINT "ck_weekly_digest_state" CHECK (state IN ('waiting','sent','dead','dropped')),
        CONSTRAINT "fk_weekly_digest_workshop" FOREIGN KEY ("workshop_id") REFERENCES "workshop" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION,
        CONSTRAINT "fk_weekly_digest_person" FOREIGN KEY ("person_id") REFERENCES "person" ("id") ON DELETE CASCADE ON UPDATE NO ACTION
      )`,
    );
    await runner.query('CREATE INDEX "ix_weekly_digest_due" ON "weekly_digest" ("state", "due_at")');
    await runner.query(
      `CREATE TABLE "digest_stop" (
        "person_id" varchar(36) PRIMARY KEY NOT NULL,
        "workshop_id" varchar(36) NOT NULL,
        "at" bigint NOT NULL,
        CONSTRAINT "fk_digest_stop_person" FOREIGN KEY ("person_id") REFERENCES "person" ("id") ON DELETE CASCADE ON UPDATE NO ACTION,
        CONSTRAINT "fk_digest_stop_workshop" FOREIGN KEY ("workshop_id") REFERENCES "workshop" ("id") ON DELETE NO ACTION ON UPDATE NO ACTION
      )`,
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE "digest_stop"');
    await runner.query('DROP INDEX "ix_weekly_digest_due"');
    await runner.query('DROP TABLE "weekly_digest"');
  }
}
