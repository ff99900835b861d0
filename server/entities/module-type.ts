import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import type { OcvTable } from '@/calc/types';
import type { ChemistryId, ResistanceKind } from '@/calc/plan-types';
import {
  idColumn,
  instantColumn,
  optionalJsonColumn,
  optionalRealColumn,
  optionalTextColumn,
  realColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Workshop } from './workshop';

/** A type of module with its maker's limits. */
@Entity({ name: 'module_type' })
@Unique('uq_module_type_name', ['workshopId', 'name'])
export class ModuleType {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_module_type_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(textColumn('chemistry'))
  chemistry!: ChemistryId;

  @Column(wholeColumn('groups_in_series'))
  groupsInSeries!: number;

  @Column(wholeColumn('cells_in_parallel'))
  cellsInParallel!: number;

  @Column(realColumn('rated_ah'))
  ratedAh!: number;

  @Column(realColumn('charge_limit_volts'))
  chargeLimitVolts!: number;

  @Column(realColumn('discharge_limit_volts'))
  dischargeLimitVolts!: number;

  @Column(realColumn('floor_volts'))
  floorVolts!: number;

  @Column(realColumn('max_charge_amps'))
  maxChargeAmps!: number;

  @Column(realColumn('max_discharge_amps'))
  maxDischargeAmps!: number;

  @Column(realColumn('min_charge_celsius'))
  minChargeCelsius!: number;

  @Column(realColumn('max_charge_celsius'))
  maxChargeCelsius!: number;

  @Column(optionalRealColumn('resistance_milliohm'))
  resistanceMilliohm!: number | null;

  @Column(textColumn('resistance_kind'))
  resistanceKind!: ResistanceKind;

  @Column(realColumn('link_milliohm'))
  linkMilliohm!: number;

  @Column(optionalRealColumn('shelf_volts'))
  shelfVolts!: number | null;

  @Column(optionalRealColumn('self_discharge_percent_per_month'))
  selfDischargePercentPerMonth!: number | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(optionalTextColumn('curve_id'))
  curveId!: string | null;

  /** The workshop's own curve. */
  @Column(optionalJsonColumn('own_curve'))
  ownCurve!: OcvTable | null;

  @Column(optionalRealColumn('pulse_short_s'))
  pulseShortS!: number | null;

  @Column(optionalRealColumn('pulse_short_milliohm'))
  pulseShortMilliohm!: number | null;

  @Column(optionalRealColumn('pulse_longer_s'))
  pulseLongerS!: number | null;

  @Column(optionalRealColumn('pulse_longer_milliohm'))
  pulseLongerMilliohm!: number | null;

  @Column(optionalRealColumn('cold_current_percent'))
  coldCurrentPercent!: number | null;

  @Column(optionalRealColumn('warm_current_percent'))
  warmCurrentPercent!: number | null;

  @Column(optionalRealColumn('precharge_below_volts'))
  prechargeBelowVolts!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
