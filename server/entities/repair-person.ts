import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, wholeColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Workshop } from './workshop';

/** Who works on a repair; the one in place 0 is asked first. */
@Entity({ name: 'repair_person' })
@Unique('uq_repair_person', ['repairId', 'personId'])
@Index('ix_repair_person_repair', ['workshopId', 'repairId'])
export class RepairPerson {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_repair_person_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_repair_person_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  @ForeignKey(() => Person, { name: 'fk_repair_person_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(wholeColumn('place'))
  place!: number;
}
