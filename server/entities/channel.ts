import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import {
  flagColumn,
  idColumn,
  optionalFlagColumn,
  optionalInstantColumn,
  optionalRealColumn,
  optionalTextColumn,
  realColumn,
  textColumn,
} from './columns';
import { Charger } from './charger';
import { Workshop } from './workshop';

/** One output of a charger. Its name is unique in the workshop, because people say only that. */
@Entity({ name: 'channel' })
@Unique('uq_channel_name', ['workshopId', 'name'])
@Index('ix_channel_charger', ['workshopId', 'chargerId'])
export class Channel {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_channel_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charger, { name: 'fk_channel_charger' })
  @Column(idColumn('charger_id'))
  chargerId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(realColumn('max_amps'))
  maxAmps!: number;

  @Column(realColumn('min_amps'))
  minAmps!: number;

  @Column(realColumn('max_volts'))
  maxVolts!: number;

  @Column(optionalRealColumn('max_watts'))
  maxWatts!: number | null;

  @Column(flagColumn('adjustable_volts'))
  adjustableVolts!: boolean;

  @Column(textColumn('senses'))
  senses!: 'own-terminals' | 'module';

  @Column(realColumn('lead_milliohm'))
  leadMilliohm!: number;

  @Column(realColumn('display_step_millivolts'))
  displayStepMillivolts!: number;

  @Column(flagColumn('single_group'))
  singleGroup!: boolean;

  @Column(flagColumn('can_discharge'))
  canDischarge!: boolean;

  @Column(optionalRealColumn('discharge_amps'))
  dischargeAmps!: number | null;

  @Column(optionalRealColumn('load_ohm'))
  loadOhm!: number | null;

  @Column(optionalRealColumn('display_step_amps'))
  displayStepAmps!: number | null;

  @Column(optionalFlagColumn('leads_measured'))
  leadsMeasured!: boolean | null;

  @Column(optionalRealColumn('derating_above_celsius'))
  deratingAboveCelsius!: number | null;

  @Column(optionalRealColumn('derating_percent'))
  deratingPercent!: number | null;

  @Column(optionalRealColumn('duty_percent'))
  dutyPercent!: number | null;

  /** Since when it is out of order; null: it is not. */
  @Column(optionalInstantColumn('fault_at'))
  faultAt!: number | null;

  @Column(optionalTextColumn('fault_seen'))
  faultSeen!: string | null;

  /** Who said so. No foreign key (see its migration); people are never deleted. */
  @Column(optionalTextColumn('fault_by_id'))
  faultById!: string | null;

  @Column(flagColumn('retired'))
  retired!: boolean;
}
