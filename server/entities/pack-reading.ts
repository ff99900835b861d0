import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { PackReadingInput, ReadingStage } from '@/shared/contract/pack-reading';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalRealColumn,
  optionalTextColumn,
  textColumn,
} from './columns';
import { Meter } from './meter';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** Voltages of all groups of a pack. Never changed: one that was wrong is set aside with the reason. */
@Entity({ name: 'pack_reading' })
@Index('ix_pack_reading_repair', ['workshopId', 'repairId', 'at'])
@Check('ck_pack_reading_stage', "stage IN ('arrival','after-fit','after-balance')")
export class PackReading {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_pack_reading_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_pack_reading_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @Column(textColumn('stage'))
  stage!: ReadingStage;

  @Column({ type: 'integer', name: 'balance_count', nullable: true })
  balanceCount!: number | null;

  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(optionalRealColumn('pack_volts'))
  packVolts!: number | null;

  @Column(optionalRealColumn('celsius'))
  celsius!: number | null;

  @Column(optionalRealColumn('rested_minutes'))
  restedMinutes!: number | null;

  @ForeignKey(() => Meter, { name: 'fk_pack_reading_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @Column(optionalTextColumn('instrument'))
  instrument!: string | null;

  @Column(textColumn('source'))
  source!: PackReadingInput['source'];

  @Column(optionalTextColumn('file_name'))
  fileName!: string | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_pack_reading_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(optionalInstantColumn('set_aside_at'))
  setAsideAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_pack_reading_set_aside_by' })
  @Column(optionalIdColumn('set_aside_by_id'))
  setAsideById!: string | null;

  @Column(optionalTextColumn('set_aside_reason'))
  setAsideReason!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
