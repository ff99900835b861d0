import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, textColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** What happened to a charge, in words, with who did it. */
@Entity({ name: 'charge_event' })
@Index('ix_charge_event_charge', ['workshopId', 'chargeId', 'at'])
export class ChargeEvent {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_charge_event_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_charge_event_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(textColumn('kind'))
  kind!: string;

  @ForeignKey(() => Person, { name: 'fk_charge_event_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(textColumn('text'))
  text!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
