import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, optionalTextColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** A visit that a running charge asks for. */
@Entity({ name: 'look_in' })
@Index('ix_look_in_charge', ['workshopId', 'chargeId', 'dueAt'])
@Unique('uq_look_in', ['chargeId', 'dueAt'])
export class LookIn {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_look_in_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_look_in_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('due_at'))
  dueAt!: number;

  @Column(optionalInstantColumn('done_at'))
  doneAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_look_in_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;
}
