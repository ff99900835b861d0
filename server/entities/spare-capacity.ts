import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { CapacitySource, CapacityState } from '@/shared/contract/spare';
import { idColumn, instantColumn, optionalIdColumn, optionalRealColumn, realColumn, textColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** A figure of a spare's capacity: typed, or found by the readings before and after a charge. */
@Entity({ name: 'spare_capacity' })
@Index('ix_spare_capacity_spare', ['workshopId', 'spareId', 'at'])
export class SpareCapacity {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_spare_capacity_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Spare, { name: 'fk_spare_capacity_spare' })
  @Column(idColumn('spare_id'))
  spareId!: string;

  /** Of one group, Ah. */
  @Column(realColumn('amp_hours'))
  ampHours!: number;

  @Column(realColumn('sd_ah'))
  sdAh!: number;

  @Column(textColumn('source'))
  source!: CapacitySource;

  @Column(textColumn('state'))
  state!: CapacityState;

  /** How far it lay from the figure of before, in standard deviations of the difference; null: typed. */
  @Column(optionalRealColumn('apart'))
  apart!: number | null;

  @ForeignKey(() => Charge, { name: 'fk_spare_capacity_charge', onDelete: 'CASCADE' })
  @Column(optionalIdColumn('charge_id'))
  chargeId!: string | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_spare_capacity_person' })
  @Column(idColumn('person_id'))
  personId!: string;
}
