import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, realColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** A resistor the workshop has for levelling groups or neighbours. */
@Entity({ name: 'levelling_resistor' })
@Unique('uq_resistor_name', ['workshopId', 'name'])
export class LevellingResistor {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_levelling_resistor_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(realColumn('ohm'))
  ohm!: number;

  @Column(realColumn('max_watts'))
  maxWatts!: number;

  @Column(wholeColumn('rev'))
  rev!: number;
}
