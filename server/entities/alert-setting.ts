import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import type { AlertWishes } from '@/shared/contract/alert-settings';
import { flagColumn, idColumn, instantColumn, jsonColumn, optionalTextColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** Where a person wants alerts to go; who has no row has it as it is by default. */
@Entity({ name: 'alert_setting' })
@Unique('uq_alert_setting_person', ['personId'])
export class AlertSetting {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_alert_setting_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_alert_setting_person', onDelete: 'CASCADE' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(jsonColumn('wishes'))
  wishes!: AlertWishes;

  /** 'HH:MM' in the workshop's zone; null: no quiet hours. */
  @Column(optionalTextColumn('quiet_from'))
  quietFrom!: string | null;

  @Column(optionalTextColumn('quiet_to'))
  quietTo!: string | null;

  @Column(flagColumn('alarms_break_through'))
  alarmsBreakThrough!: boolean;

  @Column(instantColumn('changed_at'))
  changedAt!: number;
}
