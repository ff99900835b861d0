import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { ModuleFate } from '@/shared/contract/repair';
import { idColumn, instantColumn, optionalTextColumn, textColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** A module that was taken out of a pack, and what became of it. */
@Entity({ name: 'removed_module' })
@Index('ix_removed_module_repair', ['workshopId', 'repairId', 'at'])
@Check('ck_removed_module_fate', "fate IN ('scrap','quarantine','stock','went-back-in')")
export class RemovedModule {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_removed_module_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_removed_module_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @Column(textColumn('module_position'))
  modulePosition!: string;

  @Column(textColumn('fate'))
  fate!: ModuleFate;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_removed_module_person' })
  @Column(idColumn('person_id'))
  personId!: string;
}
