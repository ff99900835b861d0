import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import type { StaffingInput } from '@/shared/contract/staffing';
import { idColumn, jsonColumn, optionalJsonColumn, wholeColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** Hours, breaks, days off and skills of one person. Who has no row has the workshop's hours and nothing else. */
@Entity({ name: 'staffing' })
@Unique('uq_staffing_person', ['personId'])
export class Staffing {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_staffing_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_staffing_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  /** Null: the workshop's. */
  @Column(optionalJsonColumn('hours'))
  hours!: StaffingInput['hours'];

  @Column(jsonColumn('breaks'))
  breaks!: StaffingInput['breaks'];

  @Column(jsonColumn('days_off'))
  daysOff!: StaffingInput['daysOff'];

  @Column(jsonColumn('skill_ids'))
  skillIds!: string[];

  @Column(wholeColumn('rev'))
  rev!: number;
}
