import type { MigrationInterface, QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';

/** Since when a channel is out of order, who said so, and what was seen. No foreign key: people are never deleted. */
const columns = { channel: { fault_at: 'bigint', fault_seen: 'varchar', fault_by_id: 'varchar' } } as const;

export class ChannelFault1767100000000 implements MigrationInterface {
  name = 'ChannelFault1767100000000';

  up(runner: QueryRunner): Promise<void> {
    return addColumns(runner, columns);
  }

  down(runner: QueryRunner): Promise<void> {
    return dropColumns(runner, columns);
  }
}
