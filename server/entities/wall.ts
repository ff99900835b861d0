import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalInstantColumn, optionalRealColumn, textColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** A paired wall screen; its token reads the board and nothing else. */
@Entity({ name: 'wall' })
@Unique('uq_wall_token', ['tokenHash'])
@Index('ix_wall_workshop', ['workshopId'])
export class Wall {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_wall_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(textColumn('token_hash'))
  tokenHash!: string;

  @Column(optionalRealColumn('diagonal_inches'))
  diagonalInches!: number | null;

  @Column(optionalRealColumn('distance_metres'))
  distanceMetres!: number | null;

  @ForeignKey(() => Person, { name: 'fk_wall_approved_by' })
  @Column(idColumn('approved_by_id'))
  approvedById!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  @Column(optionalInstantColumn('last_heard_at'))
  lastHeardAt!: number | null;

  @Column(optionalInstantColumn('revoked_at'))
  revokedAt!: number | null;
}
