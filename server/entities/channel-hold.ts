import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Channel } from './channel';
import { Charge } from './charge';
import { Workshop } from './workshop';

/** A channel held by a step of a charge. Two running steps on one channel cannot exist. */
@Entity({ name: 'channel_hold' })
@Index('ix_channel_hold_charge', ['workshopId', 'chargeId'])
@Index('ix_channel_hold_time', ['workshopId', 'state', 'toAt', 'fromAt', 'channelId'])
@Index('uq_channel_running', ['channelId'], { unique: true, where: "state = 'running'" })
@Check('ck_channel_hold_state', "state IN ('reserved','running','released')")
export class ChannelHold {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_channel_hold_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Charge, { name: 'fk_channel_hold_charge', onDelete: 'CASCADE' })
  @Column(idColumn('charge_id'))
  chargeId!: string;

  @Column(wholeColumn('step_index'))
  stepIndex!: number;

  @ForeignKey(() => Channel, { name: 'fk_channel_hold_channel' })
  @Column(idColumn('channel_id'))
  channelId!: string;

  @Column(textColumn('state'))
  state!: 'reserved' | 'running' | 'released';

  @Column(optionalInstantColumn('from_at'))
  fromAt!: number | null;

  @Column(optionalInstantColumn('to_at'))
  toAt!: number | null;
}
