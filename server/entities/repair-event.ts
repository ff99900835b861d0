import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, textColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** What happened to a repair, in words, with who did it. */
@Entity({ name: 'repair_event' })
@Index('ix_repair_event_repair', ['workshopId', 'repairId', 'at'])
export class RepairEvent {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_repair_event_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_repair_event_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @Column(instantColumn('at'))
  at!: number;

  /** Null: the clock's doing. */
  @ForeignKey(() => Person, { name: 'fk_repair_event_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(textColumn('text'))
  text!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
