import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { CheckCode } from '@/shared/contract/charge';
import { idColumn, instantColumn, optionalInstantColumn, optionalTextColumn, textColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** An answer given before clipping on; an earlier one stays. */
@Entity({ name: 'check_answer' })
@Index('uq_check_answer_present', ['chargeId', 'code'], { unique: true, where: 'replaced_at IS NULL' })
@Index('ix_check_answer_charge', ['workshopId', 'chargeId'])
export class CheckAnswer {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_check_answer_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_check_answer_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(textColumn('code'))
  code!: CheckCode;

  @Column(textColumn('answer'))
  answer!: 'yes' | 'no';

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @ForeignKey(() => Person, { name: 'fk_check_answer_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(optionalInstantColumn('replaced_at'))
  replacedAt!: number | null;
}
