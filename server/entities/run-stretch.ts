import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, optionalTextColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** A stretch in which current may flow; a hold ends one, a resume begins the next. */
@Entity({ name: 'run_stretch' })
@Index('ix_run_stretch_charge', ['workshopId', 'chargeId', 'fromAt'])
@Index('uq_run_open', ['chargeId'], { unique: true, where: 'to_at IS NULL' })
export class RunStretch {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_run_stretch_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_run_stretch_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('from_at'))
  fromAt!: number;

  @Column(optionalInstantColumn('to_at'))
  toAt!: number | null;

  @Column(optionalTextColumn('reason'))
  reason!: string | null;

  @ForeignKey(() => Person, { name: 'fk_run_stretch_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;
}
