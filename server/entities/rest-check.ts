import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import type { CheckVerdict } from '@/calc/plan-types';
import { idColumn, instantColumn, jsonColumn, optionalIdColumn, optionalRealColumn } from './columns';

/** Group voltages after the rest and the verdict on them. */
@Entity({ name: 'rest_check' })
@Index('ix_rest_check_charge', ['workshopId', 'chargeId', 'at'])
export class RestCheck {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(optionalRealColumn('celsius'))
  celsius!: number | null;

  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @Column(idColumn('person_id'))
  personId!: string;

  @Column(jsonColumn('verdict'))
  verdict!: CheckVerdict;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
