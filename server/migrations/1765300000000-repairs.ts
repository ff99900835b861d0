import { Table, TableIndex, type MigrationInterface, type QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';
import { repairsTables } from './repairs/tables';

const columns = { workshop: { technician_decides: 'boolean' } } as const;
const chargeIndex = new TableIndex({ name: 'ix_charge_repair', columnNames: ['workshop_id', 'repair_id'] });

/**
 * Repairs, from the pack's reading to the proven repair. Charges of before belong to none: nobody has kept one here.
 *
 * The repair of a charge is a plain column without a foreign key, as its neighbour is: the Table API would build the table
 * of charges anew on SQLite, and dropping the old one takes along every row that hangs on a charge.
 */
export class Repairs1765300000000 implements MigrationInterface {
  readonly name = 'Repairs1765300000000';

  async up(runner: QueryRunner): Promise<void> {
    for (const options of repairsTables) await runner.createTable(new Table(options));
    await addColumns(runner, columns);
    await runner.query('ALTER TABLE charge ADD COLUMN repair_id varchar(36)');
    await runner.createIndex('charge', chargeIndex);
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropIndex('charge', 'ix_charge_repair');
    await runner.query('ALTER TABLE charge DROP COLUMN repair_id');
    await dropColumns(runner, columns);
    for (const { name } of [...repairsTables].reverse()) await runner.dropTable(name);
  }
}
