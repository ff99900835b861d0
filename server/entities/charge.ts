import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { Direction } from '@/calc/types';
import type { Finish, PlanOption, Way } from '@/calc/plan-types';
import type { FrozenInputs, StoredReckoning } from './charge-json';
import type { Stage } from '@/shared/contract/charge';
import {
  flagColumn,
  idColumn,
  instantColumn,
  jsonColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalJsonColumn,
  optionalRealColumn,
  optionalTextColumn,
  realColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Meter } from './meter';
import { ModuleType } from './module-type';
import { Person } from './person';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** One spare being brought to one target. `option` is the way that was chosen, `frozen` the numbers it was planned with; stage and instants are the server's. */
@Entity({ name: 'charge' })
@Unique('uq_charge_number', ['workshopId', 'number'])
@Index('ix_charge_stage', ['workshopId', 'stage'])
@Index('ix_charge_due', ['nextDueAt'])
@Index('ix_charge_closed', ['workshopId', 'readyAt'])
@Index('ix_charge_spare', ['workshopId', 'spareId'])
@Index('ix_charge_neighbour', ['workshopId', 'neighbourSpareId'])
@Index('ix_charge_repair', ['workshopId', 'repairId'])
// Every act on a charge asks for the one that went on from it.
@Index('ix_charge_top_up', ['workshopId', 'topUpOf'], { where: 'top_up_of IS NOT NULL' })
@Index('uq_charge_open_spare', ['spareId'], {
  unique: true,
  where: "stage IN ('planned','queued','charging','discharging','tapering','resting','check-due','ready','held')",
})
@Check(
  'ck_charge_stage',
  "stage IN ('planned','queued','charging','discharging','tapering','resting','check-due','ready','fitted','shelved','held','stopped')",
)
export class Charge {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_charge_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('number'))
  number!: string;

  @Column(optionalTextColumn('repair_ref'))
  repairRef!: string | null;

  /** The repair it belongs to; null: none that the workshop keeps here. No foreign key (see its migration). */
  @Column(optionalIdColumn('repair_id'))
  repairId!: string | null;

  @Column(optionalTextColumn('module_position'))
  modulePosition!: string | null;

  @ForeignKey(() => Spare, { name: 'fk_charge_spare' })
  @Column(idColumn('spare_id'))
  spareId!: string;

  /**
   * The spare that a resistor joins to this one: its groups move too. Null on every other way. No foreign key (see its
   * migration); spares are never deleted.
   */
  @Column(optionalIdColumn('neighbour_spare_id'))
  neighbourSpareId!: string | null;

  @ForeignKey(() => ModuleType, { name: 'fk_charge_module_type' })
  @Column(idColumn('module_type_id'))
  moduleTypeId!: string;

  @ForeignKey(() => Person, { name: 'fk_charge_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @ForeignKey(() => Person, { name: 'fk_charge_created_by' })
  @Column(idColumn('created_by_id'))
  createdById!: string;

  @Column(textColumn('stage'))
  stage!: Stage;

  @Column(optionalTextColumn('held_from'))
  heldFrom!: Stage | null;

  @Column(textColumn('direction'))
  direction!: Direction;

  @Column(textColumn('way'))
  way!: Way;

  @Column(textColumn('finish'))
  finish!: Finish;

  @Column(realColumn('target_volts'))
  targetVolts!: number;

  @Column(realColumn('tolerance_volts'))
  toleranceVolts!: number;

  @ForeignKey(() => Meter, { name: 'fk_charge_target_meter' })
  @Column(optionalIdColumn('target_meter_id'))
  targetMeterId!: string | null;

  @Column(optionalRealColumn('target_celsius'))
  targetCelsius!: number | null;

  @Column(wholeColumn('min_rest_s'))
  minRestS!: number;

  @Column(jsonColumn('option'))
  option!: PlanOption;

  @Column(jsonColumn('frozen'))
  frozen!: FrozenInputs;

  @Column(optionalJsonColumn('reckoning'))
  reckoning!: StoredReckoning | null;

  @Column(optionalInstantColumn('ready_by'))
  readyBy!: number | null;

  @Column(instantColumn('clip_on_at'))
  clipOnAt!: number;

  @Column(instantColumn('planned_early_at'))
  plannedEarlyAt!: number;

  @Column(instantColumn('planned_likely_at'))
  plannedLikelyAt!: number;

  @Column(instantColumn('planned_late_at'))
  plannedLateAt!: number;

  @Column(optionalInstantColumn('early_at'))
  earlyAt!: number | null;

  @Column(optionalInstantColumn('likely_at'))
  likelyAt!: number | null;

  @Column(optionalInstantColumn('late_at'))
  lateAt!: number | null;

  @Column(optionalInstantColumn('queued_at'))
  queuedAt!: number | null;

  @Column(optionalInstantColumn('started_at'))
  startedAt!: number | null;

  @Column(optionalInstantColumn('taper_at'))
  taperAt!: number | null;

  @Column(optionalInstantColumn('current_end_at'))
  currentEndAt!: number | null;

  @Column(flagColumn('current_off_said'))
  currentOffSaid!: boolean;

  @Column(optionalInstantColumn('check_due_at'))
  checkDueAt!: number | null;

  @Column(optionalInstantColumn('checked_at'))
  checkedAt!: number | null;

  @Column(optionalInstantColumn('ready_at'))
  readyAt!: number | null;

  @Column(optionalInstantColumn('closed_at'))
  closedAt!: number | null;

  @Column(optionalInstantColumn('held_at'))
  heldAt!: number | null;

  @Column(optionalInstantColumn('stopped_at'))
  stoppedAt!: number | null;

  @Column(optionalTextColumn('stop_reason'))
  stopReason!: string | null;

  @ForeignKey(() => Charge, { name: 'fk_charge_top_up_of' })
  @Column(optionalIdColumn('top_up_of'))
  topUpOf!: string | null;

  @Column(optionalInstantColumn('next_due_at'))
  nextDueAt!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
