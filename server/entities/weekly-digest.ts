import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalInstantColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** What a digest says: its facts as sentences. */
export interface DigestWords {
  /** '1 to 7 June'. */
  week: string;
  facts: string[];
}

/** The waits of one week to one manager: written once, brought there after the commit. */
@Entity({ name: 'weekly_digest' })
@Unique('uq_weekly_digest', ['personId', 'monday'])
@Index('ix_weekly_digest_due', ['state', 'dueAt'])
@Check('ck_weekly_digest_state', "state IN ('waiting','sent','dead','dropped')")
export class WeeklyDigest {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_weekly_digest_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_weekly_digest_person', onDelete: 'CASCADE' })
  @Column(idColumn('person_id'))
  personId!: string;

  /** Of the week that it tells of, yyyy-mm-dd in the workshop's zone. */
  @Column(textColumn('monday'))
  monday!: string;

  @Column(jsonColumn('words'))
  words!: DigestWords;

  @Column(textColumn('state'))
  state!: 'waiting' | 'sent' | 'dead' | 'dropped';

  @Column(instantColumn('due_at'))
  dueAt!: number;

  @Column(wholeColumn('tries'))
  tries!: number;

  @Column(optionalTextColumn('reason'))
  reason!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(optionalInstantColumn('ended_at'))
  endedAt!: number | null;
}
