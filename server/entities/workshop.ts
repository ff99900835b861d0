import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { DayHours } from '@/shared/contract/workshop';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalFlagColumn,
  optionalWholeColumn,
  realColumn,
  textColumn,
  wholeColumn,
} from './columns';

/** A workshop: the tenant every other row belongs to, with its settings. */
@Entity({ name: 'workshop' })
export class Workshop {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(textColumn('zone'))
  zone!: string;

  @Column(jsonColumn('working_hours'))
  workingHours!: DayHours[];

  @Column(realColumn('tolerance_millivolts'))
  toleranceMillivolts!: number;

  @Column(wholeColumn('min_rest_minutes'))
  minRestMinutes!: number;

  @Column(wholeColumn('look_in_minutes'))
  lookInMinutes!: number;

  @Column(realColumn('inrush_limit_c'))
  inrushLimitC!: number;

  @Column(realColumn('lag_limit_millivolts'))
  lagLimitMillivolts!: number;

  /** A technician too decides where two sources disagree; null: as workshops begin, no. */
  @Column(optionalFlagColumn('technician_decides'))
  technicianDecides!: boolean | null;

  /** Charges may run while nobody is there; null: as workshops begin, no. */
  @Column(optionalFlagColumn('unattended_charges'))
  unattendedCharges!: boolean | null;

  /** What a look-in takes, min; null: 5. */
  @Column(optionalWholeColumn('look_in_visit_minutes'))
  lookInVisitMinutes!: number | null;

  /** What fitting a ready module takes, min; null: 60. */
  @Column(optionalWholeColumn('fit_minutes'))
  fitMinutes!: number | null;

  /** Minutes after which an alert nobody has taken goes on, by its level; 0: never, null: as workshops begin. */
  @Column(optionalWholeColumn('pass_on_tell_minutes'))
  passOnTellMinutes!: number | null;

  @Column(optionalWholeColumn('pass_on_amber_minutes'))
  passOnAmberMinutes!: number | null;

  @Column(optionalWholeColumn('pass_on_alarm_minutes'))
  passOnAlarmMinutes!: number | null;

  @Column(wholeColumn('board_rev'))
  boardRev!: number;

  @Column(wholeColumn('charge_count'))
  chargeCount!: number;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
