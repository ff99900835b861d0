import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalInstantColumn, optionalTextColumn, textColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** A signed-in device: hashes of the present and the previous refresh token, and the successor (sealed) given out in the grace time. */
@Entity({ name: 'session' })
@Unique('uq_session_token', ['tokenHash'])
@Index('ix_session_previous', ['previousTokenHash'])
@Index('ix_session_person', ['workshopId', 'personId'])
export class Session {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_session_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_session_person', onDelete: 'CASCADE' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(textColumn('token_hash'))
  tokenHash!: string;

  @Column(optionalTextColumn('previous_token_hash'))
  previousTokenHash!: string | null;

  @Column(optionalTextColumn('successor'))
  successor!: string | null;

  @Column(optionalInstantColumn('rotated_at'))
  rotatedAt!: number | null;

  @Column(textColumn('device'))
  device!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(instantColumn('last_used_at'))
  lastUsedAt!: number;

  @Column(instantColumn('expires_at'))
  expiresAt!: number;

  @Column(optionalInstantColumn('ended_at'))
  endedAt!: number | null;

  @Column(optionalTextColumn('end_reason'))
  endReason!: string | null;
}
