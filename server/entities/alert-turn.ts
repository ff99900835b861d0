import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import {
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Alert } from './alert';
import { Person } from './person';
import { Workshop } from './workshop';

/** With whom an alert was, from when to when, and who took it then. Turns follow each other; the last one is open. */
@Entity({ name: 'alert_turn' })
@Unique('uq_alert_turn', ['alertId', 'number'])
@Index('ix_alert_turn_alert', ['workshopId', 'alertId'])
@Check('ck_alert_turn_audience', "audience IN ('person','everybody','foremen','managers')")
@Check('ck_alert_turn_ended', "ended_by IN ('passed','not-taken','cleared')")
export class AlertTurn {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_alert_turn_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Alert, { name: 'fk_alert_turn_alert', onDelete: 'CASCADE' })
  @Column(idColumn('alert_id'))
  alertId!: string;

  /** 0 is the turn with which it was raised. */
  @Column(wholeColumn('number'))
  number!: number;

  @Column(textColumn('audience'))
  audience!: 'person' | 'everybody' | 'foremen' | 'managers';

  /** Whom it was for, where it was for one. */
  @ForeignKey(() => Person, { name: 'fk_alert_turn_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  /** Who passed it on to this turn; null: the clock, or its cause. */
  @ForeignKey(() => Person, { name: 'fk_alert_turn_passed_by' })
  @Column(optionalIdColumn('passed_by_id'))
  passedById!: string | null;

  @Column(instantColumn('from_at'))
  fromAt!: number;

  @ForeignKey(() => Person, { name: 'fk_alert_turn_taken_by' })
  @Column(optionalIdColumn('taken_by_id'))
  takenById!: string | null;

  @Column(optionalInstantColumn('taken_at'))
  takenAt!: number | null;

  @Column(optionalInstantColumn('ended_at'))
  endedAt!: number | null;

  @Column(optionalTextColumn('ended_by'))
  endedBy!: 'passed' | 'not-taken' | 'cleared' | null;
}
