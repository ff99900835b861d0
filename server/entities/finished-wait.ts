import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { Way } from '@/calc/plan-types';
import {
  flagColumn,
  idColumn,
  instantColumn,
  optionalInstantColumn,
  optionalRealColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Charge } from './charge';
import { Workshop } from './workshop';

/**
 * What a charge that became ready has cost of waiting: one narrow row of it, so that statistics need not read charges,
 * which are large. It follows from other rows (`record-waits.ts`) and is written in the transaction of what changes them.
 * The key keeps the rows of a workshop together and in the order of time: they are read as one stretch.
 */
@Entity({ name: 'finished_wait' })
@Index('uq_finished_wait_charge', ['chargeId'], { unique: true })
export class FinishedWait {
  @ForeignKey(() => Workshop, { name: 'fk_finished_wait_workshop' })
  @PrimaryColumn(idColumn('workshop_id'))
  workshopId!: string;

  @PrimaryColumn(instantColumn('ready_at'))
  readyAt!: number;

  @ForeignKey(() => Charge, { name: 'fk_finished_wait_charge', onDelete: 'CASCADE' })
  @PrimaryColumn(idColumn('charge_id'))
  chargeId!: string;

  /** When the wait began. */
  @Column(instantColumn('asked_at'))
  askedAt!: number;

  @Column(idColumn('module_type_id'))
  moduleTypeId!: string;

  /** Of its first step; 'none': it used none. */
  @Column(idColumn('charger_id'))
  chargerId!: string;

  @Column(idColumn('channel_id'))
  channelId!: string;

  /** Whose it was; 'none': nobody's. */
  @Column(idColumn('technician_id'))
  technicianId!: string;

  @Column(textColumn('way'))
  way!: Way;

  /** Of the day on which it became ready, in the workshop's zone: 1 is Monday. */
  @Column(wholeColumn('weekday'))
  weekday!: number;

  /** Monday of that week, yyyy-mm-dd. */
  @Column(textColumn('monday'))
  monday!: string;

  @Column(instantColumn('wait_ms'))
  waitMs!: number;

  /** Of the wait within working hours: one of its people was at other work, and the rest. */
  @Column(instantColumn('used_ms'))
  usedMs!: number;

  @Column(instantColumn('lost_ms'))
  lostMs!: number;

  /** Actual minus planned likely finish. */
  @Column(instantColumn('late_ms'))
  lateMs!: number;

  /** It finished inside its planned band. */
  @Column(flagColumn('in_band'))
  inBand!: boolean;

  /** Null: it had no such stage. */
  @Column(optionalInstantColumn('queue_ms'))
  queueMs!: number | null;

  @Column(optionalInstantColumn('charging_ms'))
  chargingMs!: number | null;

  @Column(optionalInstantColumn('tapering_ms'))
  taperingMs!: number | null;

  @Column(optionalInstantColumn('resting_ms'))
  restingMs!: number | null;

  @Column(optionalInstantColumn('check_due_ms'))
  checkDueMs!: number | null;

  /** When its repair was booked; null: it had none. */
  @Column(optionalInstantColumn('booked_at'))
  bookedAt!: number | null;

  /** When it was wished to be ready; null: nobody said. */
  @Column(optionalInstantColumn('due_at'))
  dueAt!: number | null;

  /** Its first channel was taken, and its last one free again; null: it used none. */
  @Column(optionalInstantColumn('held_from_at'))
  heldFromAt!: number | null;

  @Column(optionalInstantColumn('held_to_at'))
  heldToAt!: number | null;

  /** What it was planned with: mean rest volts of its groups, those that were aimed at, and Ah of one group; null: not known. */
  @Column(optionalRealColumn('from_volts'))
  fromVolts!: number | null;

  @Column(optionalRealColumn('to_volts'))
  toVolts!: number | null;

  @Column(optionalRealColumn('group_ah'))
  groupAh!: number | null;
}
