import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { Role } from '@/shared/contract/roles';
import { idColumn, instantColumn, optionalIdColumn, optionalInstantColumn, textColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** A one-use link to join, or to set a new password. */
@Entity({ name: 'invitation' })
@Unique('uq_invitation_token', ['tokenHash'])
@Index('ix_invitation_workshop', ['workshopId'])
export class Invitation {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_invitation_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('kind'))
  kind!: 'join' | 'reset';

  @Column(textColumn('email'))
  email!: string;

  @Column(textColumn('role'))
  role!: Role;

  @ForeignKey(() => Person, { name: 'fk_invitation_person' })
  @Column(optionalIdColumn('person_id'))
  personId!: string | null;

  @Column(textColumn('token_hash'))
  tokenHash!: string;

  @ForeignKey(() => Person, { name: 'fk_invitation_invited_by' })
  @Column(idColumn('invited_by_id'))
  invitedById!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(instantColumn('expires_at'))
  expiresAt!: number;

  @Column(optionalInstantColumn('used_at'))
  usedAt!: number | null;

  @Column(optionalInstantColumn('recalled_at'))
  recalledAt!: number | null;
}
