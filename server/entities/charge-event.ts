import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, textColumn } from './columns';

/** What happened to a charge, in words, with who did it. */
@Entity({ name: 'charge_event' })
@Index('ix_charge_event_charge', ['workshopId', 'chargeId', 'at'])
export class ChargeEvent {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(textColumn('kind'))
  kind!: string;

  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(textColumn('text'))
  text!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
