import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** An entry of the workshop's own list of skills. One that work has named is never deleted, only taken off the list. */
@Entity({ name: 'skill' })
@Index('uq_skill_name', ['workshopId', 'name'], { unique: true, where: 'retired_at IS NULL' })
export class Skill {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_skill_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  /** Taken off the list; null: on it. Work that is over keeps its name. */
  @Column(optionalInstantColumn('retired_at'))
  retiredAt!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;
}
