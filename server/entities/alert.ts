import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { AlertLevel } from '@/shared/contract/alert';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import {
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Charge } from './charge';
import { Person } from './person';
import { Workshop } from './workshop';

/** One alert a cause; the cause key makes it so across restarts. About a charge, or about a wall. */
@Entity({ name: 'alert' })
@Unique('uq_alert_cause', ['cause'])
@Index('ix_alert_open', ['workshopId', 'clearedAt', 'raisedAt'])
@Index('ix_alert_pass', ['passDueAt'])
@Index('ix_alert_wall', ['wallId'])
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
  level!: AlertLevel;

  @ForeignKey(() => Charge, { name: 'fk_alert_charge', onDelete: 'CASCADE' })
  @Column(optionalIdColumn('charge_id'))
  chargeId!: string | null;

  /** The wall it is about. No foreign key (see its migration); walls are never deleted. */
  @Column(optionalIdColumn('wall_id'))
  wallId!: string | null;

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

  /** Number of its present turn: whom it is with (see AlertTurn). */
  @Column({ ...wholeColumn('turn'), default: 0 })
  turn!: number;

  /** It has gone on to those of this role because nobody took it. */
  @Column(optionalTextColumn('for_role'))
  forRole!: 'foreman' | 'manager' | null;

  /** When it goes on if nobody has taken it by then; null: it stays. */
  @Column(optionalInstantColumn('pass_due_at'))
  passDueAt!: number | null;

  @Column(optionalInstantColumn('cleared_at'))
  clearedAt!: number | null;
}
