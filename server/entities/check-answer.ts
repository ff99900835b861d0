import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import type { CheckCode } from '@/shared/contract/charge';
import { idColumn, instantColumn, optionalInstantColumn, optionalTextColumn, textColumn } from './columns';

/** An answer given before clipping on; an earlier one stays. */
@Entity({ name: 'check_answer' })
@Index('uq_check_answer_present', ['chargeId', 'code'], { unique: true, where: 'replaced_at IS NULL' })
@Index('ix_check_answer_charge', ['workshopId', 'chargeId'])
export class CheckAnswer {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(textColumn('code'))
  code!: CheckCode;

  @Column(textColumn('answer'))
  answer!: 'yes' | 'no';

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(idColumn('person_id'))
  personId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(optionalInstantColumn('replaced_at'))
  replacedAt!: number | null;
}
