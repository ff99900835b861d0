import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, optionalInstantColumn, realColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** A meter that readings name, with what it was last found to be off by. */
@Entity({ name: 'meter' })
@Unique('uq_meter_name', ['workshopId', 'name'])
export class Meter {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_meter_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(realColumn('offset_millivolts'))
  offsetMillivolts!: number;

  @Column(optionalInstantColumn('checked_at'))
  checkedAt!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;
}
