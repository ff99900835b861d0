import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { StintState } from '@/shared/contract/work';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Person } from './person';
import { Place } from './place';
import { Work } from './work';
import { Workshop } from './workshop';

/** A stretch in which somebody does a piece of work, or is to. */
@Entity({ name: 'work_stint' })
@Index('ix_work_stint_work', ['workshopId', 'workId'])
@Index('ix_work_stint_person', ['workshopId', 'personId', 'fromAt'])
@Index('ix_work_stint_time', ['workshopId', 'toAt'])
@Index('uq_work_stint_begun', ['personId'], { unique: true, where: "state = 'begun'" })
@Check('ck_work_stint_state', "state IN ('taken','begun','done','given-back')")
export class WorkStint {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_work_stint_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Work, { name: 'fk_work_stint_work', onDelete: 'CASCADE' })
  @Column(idColumn('work_id'))
  workId!: string;

  @ForeignKey(() => Person, { name: 'fk_work_stint_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  /** Who gave it; null: taken by the person. */
  @ForeignKey(() => Person, { name: 'fk_work_stint_given_by' })
  @Column(optionalIdColumn('given_by_id'))
  givenById!: string | null;

  @ForeignKey(() => Place, { name: 'fk_work_stint_place' })
  @Column(optionalIdColumn('place_id'))
  placeId!: string | null;

  @Column(textColumn('state'))
  state!: StintState;

  /** As planned, by the long estimate. */
  @Column(instantColumn('from_at'))
  fromAt!: number;

  @Column(instantColumn('to_at'))
  toAt!: number;

  /** What it takes of the work's likely and long estimate, min. */
  @Column(wholeColumn('likely_minutes'))
  likelyMinutes!: number;

  @Column(wholeColumn('long_minutes'))
  longMinutes!: number;

  @Column(optionalInstantColumn('begun_at'))
  begunAt!: number | null;

  @Column(optionalInstantColumn('ended_at'))
  endedAt!: number | null;

  /** The charge in whose wait it lies. No foreign key: dropped plans go, what was done in their wait stays. */
  @Column(optionalIdColumn('wait_charge_id'))
  waitChargeId!: string | null;
}
