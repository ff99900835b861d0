import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Wall } from './wall';
import { Workshop } from './workshop';

/** A pairing in progress (RFC 8628). Belongs to a workshop only from its approval on. */
@Entity({ name: 'wall_code' })
@Unique('uq_wall_code_device', ['deviceCodeHash'])
@Index('ix_wall_code_user', ['userCode'])
export class WallCode {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(textColumn('device_code_hash'))
  deviceCodeHash!: string;

  @Column(textColumn('user_code'))
  userCode!: string;

  @Column(textColumn('device'))
  device!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(instantColumn('expires_at'))
  expiresAt!: number;

  @Column(wholeColumn('interval_s'))
  intervalS!: number;

  @Column(optionalInstantColumn('last_polled_at'))
  lastPolledAt!: number | null;

  @ForeignKey(() => Workshop, { name: 'fk_wall_code_workshop' })
  @Column(optionalIdColumn('workshop_id'))
  workshopId!: string | null;

  @ForeignKey(() => Wall, { name: 'fk_wall_code_wall' })
  @Column(optionalIdColumn('wall_id'))
  wallId!: string | null;

  @Column(optionalInstantColumn('collected_at'))
  collectedAt!: number | null;
}
