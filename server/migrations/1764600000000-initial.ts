import { Table, type MigrationInterface, type QueryRunner } from 'typeorm';
import { chargesTables } from './initial/charges';
import { equipmentTables } from './initial/equipment';
import { peopleTables } from './initial/people';
import { wallsTables } from './initial/walls';

// Parents first: a foreign key names a table that exists.
const tables = [...peopleTables, ...equipmentTables, ...chargesTables, ...wallsTables];

/** The first tables. Written through the Table API, so that the same file serves SQLite and PostgreSQL. */
export class Initial1764600000000 implements MigrationInterface {
  readonly name = 'Initial1764600000000';

  async up(runner: QueryRunner): Promise<void> {
    for (const options of tables) await runner.createTable(new Table(options));
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const { name } of [...tables].reverse()) await runner.dropTable(name);
  }
}
