import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalIdColumn,
  optionalRealColumn,
  optionalTextColumn,
} from './columns';
import { Meter } from './meter';
import { Person } from './person';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** Group voltages of a spare at rest. */
@Entity({ name: 'spare_reading' })
@Index('ix_spare_reading_spare', ['workshopId', 'spareId', 'at'])
export class SpareReading {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_spare_reading_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Spare, { name: 'fk_spare_reading_spare' })
  @Column(idColumn('spare_id'))
  spareId!: string;

  @Column(instantColumn('at'))
  at!: number;

  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(optionalRealColumn('celsius'))
  celsius!: number | null;

  @ForeignKey(() => Meter, { name: 'fk_spare_reading_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @ForeignKey(() => Person, { name: 'fk_spare_reading_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
