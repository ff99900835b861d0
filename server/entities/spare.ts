import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { NumberSource } from '@/calc/plan-types';
import type { SpareInput } from '@/shared/contract/spare';
import {
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalRealColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { ModuleType } from './module-type';
import { Person } from './person';
import { Workshop } from './workshop';

/** One physical replacement module in stock. */
@Entity({ name: 'spare' })
@Unique('uq_spare_label', ['workshopId', 'label'])
@Index('ix_spare_type', ['workshopId', 'moduleTypeId'])
export class Spare {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_spare_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('label'))
  label!: string;

  @ForeignKey(() => ModuleType, { name: 'fk_spare_module_type' })
  @Column(idColumn('module_type_id'))
  moduleTypeId!: string;

  @Column(optionalTextColumn('shelf_place'))
  shelfPlace!: string | null;

  @Column(optionalRealColumn('capacity_ah'))
  capacityAh!: number | null;

  @Column(optionalRealColumn('health_percent'))
  healthPercent!: number | null;

  @Column(textColumn('capacity_source'))
  capacitySource!: NumberSource;

  /** Standard deviation of the capacity where a charge has told it, Ah; null: as its source is good for. */
  @Column(optionalRealColumn('capacity_sd_ah'))
  capacitySdAh!: number | null;

  @Column(textColumn('condition'))
  condition!: SpareInput['condition'];

  @Column(optionalTextColumn('quarantine_reason'))
  quarantineReason!: string | null;

  @Column(optionalInstantColumn('quarantined_at'))
  quarantinedAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_spare_quarantined_by' })
  @Column(optionalIdColumn('quarantined_by_id'))
  quarantinedById!: string | null;

  @Column(optionalInstantColumn('fitted_at'))
  fittedAt!: number | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
