import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import {
  flagColumn,
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Meter } from './meter';
import { Workshop } from './workshop';

/** A charger; what can run is its channels. */
@Entity({ name: 'charger' })
@Unique('uq_charger_name', ['workshopId', 'name'])
export class Charger {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_charger_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(optionalTextColumn('place'))
  place!: string | null;

  @ForeignKey(() => Meter, { name: 'fk_charger_meter' })
  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @Column(flagColumn('retired'))
  retired!: boolean;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
