import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { AlertKind } from '@/shared/contract/alert';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** One alert a cause; the cause key makes it so across restarts. */
@Entity({ name: 'alert' })
@Unique('uq_alert_cause', ['cause'])
@Index('ix_alert_open', ['workshopId', 'clearedAt', 'raisedAt'])
export class Alert {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_alert_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('cause'))
  cause!: string;

  @Column(textColumn('kind'))
  kind!: AlertKind;

  @Column(textColumn('level'))
  level!: 'tell' | 'amber' | 'alarm';

  @ForeignKey(() => Charge, { name: 'fk_alert_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @ForeignKey(() => Person, { name: 'fk_alert_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(textColumn('title'))
  title!: string;

  @Column(textColumn('seen'))
  seen!: string;

  @Column(textColumn('check_first'))
  checkFirst!: string;

  @Column(instantColumn('raised_at'))
  raisedAt!: number;

  @Column(wholeColumn('late_by_s'))
  lateByS!: number;

  @ForeignKey(() => Person, { name: 'fk_alert_taken_by' })
  @Column(optionalIdColumn('taken_by_id'))
  takenById!: string | null;

  @Column(optionalInstantColumn('taken_at'))
  takenAt!: number | null;

  /** When it was last passed on to whom it is for now. */
  @Column(optionalInstantColumn('passed_at'))
  passedAt!: number | null;

  @Column(optionalInstantColumn('cleared_at'))
  clearedAt!: number | null;
}
