import { Column, Entity, PrimaryColumn, Unique } from 'typeorm';
import {
  flagColumn,
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';

/** A charger; what can run is its channels. */
@Entity({ name: 'charger' })
@Unique('uq_charger_name', ['workshopId', 'name'])
export class Charger {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(optionalTextColumn('place'))
  place!: string | null;

  @Column(optionalIdColumn('meter_id'))
  meterId!: string | null;

  @Column(flagColumn('retired'))
  retired!: boolean;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
