import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalIdColumn,
  optionalRealColumn,
  optionalTextColumn,
} from './columns';

/** Group voltages of a spare at rest. */
@Entity({ name: 'spare_reading' })
@Index('ix_spare_reading_spare', ['workshopId', 'spareId', 'at'])
export class SpareReading {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(idColumn('spare_id'))
  spareId!: string;

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

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
