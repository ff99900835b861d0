import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** An entry of the workshop's own list of skills. */
@Entity({ name: 'skill' })
@Unique('uq_skill_name', ['workshopId', 'name'])
export class Skill {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_skill_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(wholeColumn('rev'))
  rev!: number;
}
