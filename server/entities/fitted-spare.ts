import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, jsonColumn, optionalTextColumn, realColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** A spare that went into a pack without a charge: it rested within the tolerance of the target already. */
@Entity({ name: 'fitted_spare' })
@Index('ix_fitted_spare_repair', ['workshopId', 'repairId', 'at'])
export class FittedSpare {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_fitted_spare_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_fitted_spare_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @ForeignKey(() => Spare, { name: 'fk_fitted_spare_spare' })
  @Column(idColumn('spare_id'))
  spareId!: string;

  @Column(optionalTextColumn('module_position'))
  modulePosition!: string | null;

  /** As it was read last, by which it is within the tolerance. */
  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(realColumn('target_volts'))
  targetVolts!: number;

  @Column(realColumn('tolerance_millivolts'))
  toleranceMillivolts!: number;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_fitted_spare_person' })
  @Column(idColumn('person_id'))
  personId!: string;
}
