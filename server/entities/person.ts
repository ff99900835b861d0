import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { Role } from '@/shared/contract/roles';
import { idColumn, instantColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** Somebody who signs in. An address belongs to one person of one workshop. */
@Entity({ name: 'person' })
@Unique('uq_person_email', ['email'])
@Index('ix_person_workshop', ['workshopId'])
@Check('ck_person_role', "role IN ('technician','foreman','manager')")
export class Person {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_person_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(textColumn('email'))
  email!: string;

  @Column(textColumn('password_hash'))
  passwordHash!: string;

  @Column(textColumn('role'))
  role!: Role;

  @Column(optionalInstantColumn('disabled_at'))
  disabledAt!: number | null;

  @Column(optionalInstantColumn('last_seen_at'))
  lastSeenAt!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
