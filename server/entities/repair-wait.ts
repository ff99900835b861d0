import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, optionalTextColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** A stretch in which a repair could do nothing but wait for its module. Recorded by itself; a person may correct it. */
@Entity({ name: 'repair_wait' })
@Index('ix_repair_wait_repair', ['workshopId', 'repairId', 'fromAt'])
@Index('uq_repair_wait_open', ['repairId'], { unique: true, where: 'to_at IS NULL' })
export class RepairWait {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_repair_wait_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_repair_wait_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @Column(instantColumn('from_at'))
  fromAt!: number;

  /** Null: it waits still. */
  @Column(optionalInstantColumn('to_at'))
  toAt!: number | null;

  @Column(optionalTextColumn('module_position'))
  modulePosition!: string | null;

  @Column(optionalTextColumn('correction_reason'))
  correctionReason!: string | null;

  @Column(optionalInstantColumn('corrected_at'))
  correctedAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_repair_wait_corrected_by' })
  @Column(optionalIdColumn('corrected_by_id'))
  correctedById!: string | null;
}
