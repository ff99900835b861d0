import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { PlaceKind } from '@/shared/contract/staffing';
import { idColumn, optionalInstantColumn, textColumn, wholeColumn } from './columns';
import { Workshop } from './workshop';

/** A bay or a bench. Work keeps its name by the id; one that work has named is never deleted, only taken off the list. */
@Entity({ name: 'place' })
@Index('uq_place_name', ['workshopId', 'name'], { unique: true, where: 'retired_at IS NULL' })
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

  /** Taken off the list; null: on it. Work that is over keeps its name. */
  @Column(optionalInstantColumn('retired_at'))
  retiredAt!: number | null;

  @Column(wholeColumn('rev'))
  rev!: number;
}
