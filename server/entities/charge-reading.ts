import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import {
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalJsonColumn,
  optionalRealColumn,
  optionalTextColumn,
  textColumn,
} from './columns';
import { Charge } from './charge';
import { Meter } from './meter';
import { Person } from './person';
import { Workshop } from './workshop';

/** A reading taken while a charge runs or rests. A corrected one stays, with what replaced it. */
@Entity({ name: 'charge_reading' })
@Index('ix_charge_reading_charge', ['workshopId', 'chargeId', 'at'])
export class ChargeReading {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_charge_reading_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_charge_reading_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(optionalRealColumn('terminal_volts'))
  terminalVolts!: number | null;

  @Column(optionalRealColumn('amps'))
  amps!: number | null;

  @Column(optionalRealColumn('celsius'))
  celsius!: number | null;

  @Column(optionalJsonColumn('group_volts'))
  groupVolts!: number[] | null;

  /** Where the volts between the clips were read; null: nobody has said. */
  @Column(optionalTextColumn('taken_at_place'))
  takenAt!: 'supply' | 'module' | null;

  @ForeignKey(() => Meter, { name: 'fk_charge_reading_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @ForeignKey(() => Person, { name: 'fk_charge_reading_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(textColumn('source'))
  source!: 'typed' | 'file';

  @Column(optionalIdColumn('replaces_id'))
  replacesId!: string | null;

  @Column(optionalIdColumn('replaced_by_id'))
  replacedById!: string | null;

  @Column(optionalTextColumn('reason'))
  reason!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
