import { Column, Entity, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, optionalTextColumn } from './columns';

/** A visit that a running charge asks for. */
@Entity({ name: 'look_in' })
@Index('ix_look_in_charge', ['workshopId', 'chargeId', 'dueAt'])
@Unique('uq_look_in', ['chargeId', 'dueAt'])
export class LookIn {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('due_at'))
  dueAt!: number;

  @Column(optionalInstantColumn('done_at'))
  doneAt!: number | null;

  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;
}
