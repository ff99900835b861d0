import { Check, Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import type { PlaceKind } from '@/shared/contract/staffing';
import { idColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** A bay or a bench. Work keeps its name by the id; one that work has named is never deleted, only taken off the list. */
@Entity({ name: 'place' })
@Unique('uq_place_name', ['workshopId', 'name'])
@Check('ck_place_kind', "kind IN ('bay','bench')")
export class Place {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_place_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @Column(textColumn('kind'))
  kind!: PlaceKind;

  @Column(wholeColumn('rev'))
  rev!: number;
}
