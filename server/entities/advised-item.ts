import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { AdvisedOutcome } from '@/shared/contract/repair';
import { idColumn, instantColumn, optionalInstantColumn, optionalTextColumn, textColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** What the owner of a vehicle was advised, and what became of it. */
@Entity({ name: 'advised_item' })
@Index('ix_advised_item_repair', ['workshopId', 'repairId', 'at'])
@Check('ck_advised_item_outcome', "outcome IN ('open','done','booked','declined')")
export class AdvisedItem {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_advised_item_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_advised_item_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @Column(textColumn('text'))
  text!: string;

  @Column(textColumn('outcome'))
  outcome!: AdvisedOutcome;

  @Column(optionalTextColumn('detail'))
  detail!: string | null;

  /** The customer's name, typed as agreement. */
  @Column(optionalTextColumn('agreed_by'))
  agreedBy!: string | null;

  @Column(optionalInstantColumn('agreed_at'))
  agreedAt!: number | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_advised_item_person' })
  @Column(idColumn('person_id'))
  personId!: string;
}
