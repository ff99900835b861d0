import { TableIndex, type MigrationInterface, type QueryRunner } from 'typeorm';

interface ChargeRow {
  id: string;
  workshop_id: string;
  frozen: string;
}
interface SpareRow {
  id: string;
  workshop_id: string;
  label: string;
}

const indices = {
  ix_charge_spare: ['workshop_id', 'spare_id'],
  ix_charge_neighbour: ['workshop_id', 'neighbour_spare_id'],
};

/**
 * The spare that a resistor has joined to the charged one, which until now only the frozen plan named by its label: its
 * readings of before are no longer true either.
 *
 * Plain statements, which both databases have, and no foreign key: the Table API would build the table of charges anew on
 * SQLite, and dropping the old one takes along every row that hangs on a charge.
 */
export class NeighbourSpare1764700000000 implements MigrationInterface {
  readonly name = 'NeighbourSpare1764700000000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE charge ADD COLUMN neighbour_spare_id varchar(36)');
    for (const [name, columnNames] of Object.entries(indices))
      await runner.createIndex('charge', new TableIndex({ name, columnNames }));
    await fillIn(runner);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const name of Object.keys(indices)) await runner.dropIndex('charge', name);
    await runner.query('ALTER TABLE charge DROP COLUMN neighbour_spare_id');
  }
}

/** Statements without parameters: their marks differ between the databases. Ids are made in code, of a safe alphabet. */
async function fillIn(runner: QueryRunner): Promise<void> {
  const charges = (await runner.query(
    "SELECT id, workshop_id, frozen FROM charge WHERE way = 'resistor'",
  )) as ChargeRow[];
  if (charges.length === 0) return;
  const spares = (await runner.query('SELECT id, workshop_id, label FROM spare')) as SpareRow[];
  const ids = new Map(spares.map((spare) => [`${spare.workshop_id} ${spare.label}`, spare.id]));
  for (const charge of charges) {
    const { neighbour } = JSON.parse(charge.frozen) as { neighbour: { label: string } | null };
    const spareId = neighbour && ids.get(`${charge.workshop_id} ${neighbour.label}`);
    if (!spareId) continue;
    for (const id of [spareId, charge.id]) if (!/^[\w-]+$/.test(id)) throw new Error(`${id} is no id of ours.`);
    await runner.query(`UPDATE charge SET neighbour_spare_id = '${spareId}' WHERE id = '${charge.id}'`);
  }
}
