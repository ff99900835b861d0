import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { PhotoSight } from '@/shared/contract/photo';
import { idColumn, instantColumn, optionalIdColumn, optionalTextColumn, textColumn, wholeColumn } from './columns';
import { Person } from './person';
import { Repair } from './repair';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** A photo of a repair. The picture itself and its thumbnail lie in the data folder, under `file`. */
@Entity({ name: 'photo' })
@Unique('uq_photo_file', ['file'])
@Index('ix_photo_repair', ['workshopId', 'repairId', 'at'])
@Check('ck_photo_seen', "seen IN ('none','swelling','leak','damage')")
export class Photo {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_photo_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Repair, { name: 'fk_photo_repair', onDelete: 'CASCADE' })
  @Column(idColumn('repair_id'))
  repairId!: string;

  /** Random name of its files, without ending. */
  @Column(textColumn('file'))
  file!: string;

  @Column(wholeColumn('width'))
  width!: number;

  @Column(wholeColumn('height'))
  height!: number;

  @Column(wholeColumn('bytes'))
  bytes!: number;

  /** Of the picture as it is kept, hexadecimal. */
  @Column(textColumn('sha256'))
  sha256!: string;

  @Column(optionalTextColumn('caption'))
  caption!: string | null;

  @Column(textColumn('seen'))
  seen!: PhotoSight;

  @Column(optionalTextColumn('module_position'))
  modulePosition!: string | null;

  @ForeignKey(() => Spare, { name: 'fk_photo_spare' })
  @Column(optionalIdColumn('spare_id'))
  spareId!: string | null;

  @Column(instantColumn('at'))
  at!: number;

  @ForeignKey(() => Person, { name: 'fk_photo_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(wholeColumn('rev'))
  rev!: number;
}
