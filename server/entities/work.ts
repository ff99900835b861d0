import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { WorkPriority } from '@/shared/contract/work-terms';
import {
  flagColumn,
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Person } from './person';
import { Place } from './place';
import { Repair } from './repair';
import { Skill } from './skill';
import { Workshop } from './workshop';

/** A piece of other work. What is taken of it are its stints; `leftMinutes` is what nobody has in hand. */
@Entity({ name: 'work' })
@Unique('uq_work_number', ['workshopId', 'number'])
@Index('ix_work_open', ['workshopId', 'overAt'])
@Index('ix_work_repair', ['workshopId', 'repairId'])
@Check('ck_work_priority', "priority IN ('low','usual','high','urgent')")
export class Work {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_work_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('number'))
  number!: string;

  @Column(textColumn('title'))
  title!: string;

  @Column(wholeColumn('likely_minutes'))
  likelyMinutes!: number;

  @Column(wholeColumn('long_minutes'))
  longMinutes!: number;

  @ForeignKey(() => Skill, { name: 'fk_work_skill' })
  @Column(optionalIdColumn('skill_id'))
  skillId!: string | null;

  @ForeignKey(() => Place, { name: 'fk_work_place' })
  @Column(optionalIdColumn('place_id'))
  placeId!: string | null;

  @Column(textColumn('priority'))
  priority!: WorkPriority;

  @Column(optionalInstantColumn('due_at'))
  dueAt!: number | null;

  @ForeignKey(() => Repair, { name: 'fk_work_repair' })
  @Column(optionalIdColumn('repair_id'))
  repairId!: string | null;

  @Column(flagColumn('splittable'))
  splittable!: boolean;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  /** Of the likely and of the long estimate what nobody has in hand, min. */
  @Column(wholeColumn('left_minutes'))
  leftMinutes!: number;

  @Column(wholeColumn('left_long_minutes'))
  leftLongMinutes!: number;

  /** Done or dropped. */
  @Column(optionalInstantColumn('over_at'))
  overAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_work_over_by' })
  @Column(optionalIdColumn('over_by_id'))
  overById!: string | null;

  /** Why it was dropped; null: it was done. */
  @Column(optionalTextColumn('drop_reason'))
  dropReason!: string | null;

  @ForeignKey(() => Person, { name: 'fk_work_created_by' })
  @Column(idColumn('created_by_id'))
  createdById!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(wholeColumn('rev'))
  rev!: number;
}
