import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { DecideSourceInput } from '@/shared/contract/pack-reading';
import {
  flagColumn,
  idColumn,
  instantColumn,
  jsonColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalJsonColumn,
  optionalRealColumn,
  optionalTextColumn,
  textColumn,
} from './columns';
import { Meter } from './meter';
import { PackReading } from './pack-reading';
import { Person } from './person';
import { Repair } from './repair';
import type { DifferingGroup, HealthyGroup } from './repair-json';
import { Workshop } from './workshop';

/** What a hand meter shows at the suspected module, whether that agrees with the pack, and what somebody decided. */
@Entity({ name: 'second_source' })
@Index('ix_second_source_repair', ['workshopId', 'repairId', 'at'])
@Check('ck_second_source_decision', "decision IN ('module','read-again')")
export class SecondSource {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_second_source_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_second_source_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @ForeignKey(() => PackReading, { name: 'fk_second_source_reading' })
  @Column(idColumn('reading_id'))
  readingId!: string;

  @Column(textColumn('module_position'))
  modulePosition!: string;

  @Column(jsonColumn('group_volts'))
  groupVolts!: number[];

  @Column(optionalJsonColumn('healthy_group'))
  healthyGroup!: HealthyGroup | null;

  @ForeignKey(() => Meter, { name: 'fk_second_source_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @Column(optionalTextColumn('points_to'))
  pointsTo!: string | null;

  @Column(flagColumn('agrees'))
  agrees!: boolean;

  @Column(jsonColumn('differs'))
  differs!: DifferingGroup[];

  @Column(optionalRealColumn('offset_millivolts'))
  offsetMillivolts!: number | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_second_source_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(optionalTextColumn('decision'))
  decision!: DecideSourceInput['decision'] | null;

  @Column(optionalTextColumn('decided_position'))
  decidedPosition!: string | null;

  @Column(optionalTextColumn('decision_reason'))
  decisionReason!: string | null;

  @Column(optionalInstantColumn('decided_at'))
  decidedAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_second_source_decided_by' })
  @Column(optionalIdColumn('decided_by_id'))
  decidedById!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
