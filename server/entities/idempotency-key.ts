import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, jsonColumn, textColumn, wholeColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** The stored answer of a write that must happen once. */
@Entity({ name: 'idempotency_key' })
@Unique('uq_idempotency', ['personId', 'route', 'key'])
@Index('ix_idempotency_age', ['createdAt'])
export class IdempotencyKey {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_idempotency_key_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_idempotency_key_person', onDelete: 'CASCADE' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(textColumn('route'))
  route!: string;

  @Column(textColumn('key'))
  key!: string;

  @Column(textColumn('body_hash'))
  bodyHash!: string;

  @Column(wholeColumn('status'))
  status!: number;

  @Column(jsonColumn('response'))
  response!: unknown;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
