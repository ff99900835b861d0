import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { CheckVerdict } from '@/calc/plan-types';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalFlagColumn,
  optionalIdColumn,
  optionalRealColumn,
} from './columns';
import { Charge } from './charge';
import { Meter } from './meter';
import { Person } from './person';
import { Workshop } from './workshop';

/** Group voltages after the rest and the verdict on them. */
@Entity({ name: 'rest_check' })
@Index('ix_rest_check_charge', ['workshopId', 'chargeId', 'at'])
export class RestCheck {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_rest_check_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_rest_check_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(optionalRealColumn('celsius'))
  celsius!: number | null;

  @ForeignKey(() => Meter, { name: 'fk_rest_check_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @ForeignKey(() => Person, { name: 'fk_rest_check_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(jsonColumn('verdict'))
  verdict!: CheckVerdict;

  /** It came before the minimum rest was over; null: nobody noted it. */
  @Column(optionalFlagColumn('early'))
  early!: boolean | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
