import { Column, Entity, ForeignKey, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn } from './columns';
import { Person } from './person';
import { Workshop } from './workshop';

/** A person who wants no weekly digest; who has no row gets it. */
@Entity({ name: 'digest_stop' })
export class DigestStop {
  @ForeignKey(() => Person, { name: 'fk_digest_stop_person', onDelete: 'CASCADE' })
  @PrimaryColumn(idColumn('person_id'))
  personId!: string;

  @ForeignKey(() => Workshop, { name: 'fk_digest_stop_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(instantColumn('at'))
  at!: number;
}
