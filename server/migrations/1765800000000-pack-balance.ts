import type { MigrationInterface, QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';

const own = { bleed_amps: 'double precision', aim_millivolts: 'double precision' } as const;
const columns = { pack_type: own, repair: own };

/** What a pack balances with and down to; empty, as in all that were there, stands for the usual. */
export class PackBalance1765800000000 implements MigrationInterface {
  readonly name = 'PackBalance1765800000000';

  up(runner: QueryRunner): Promise<void> {
    return addColumns(runner, columns);
  }

  down(runner: QueryRunner): Promise<void> {
    return dropColumns(runner, columns);
  }
}
