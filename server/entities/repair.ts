import { Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import {
  idColumn,
  instantColumn,
  optionalIdColumn,
  optionalInstantColumn,
  optionalJsonColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { ModuleType } from './module-type';
import { packColumns } from './pack-columns';
import { PackType } from './pack-type';
import { Person } from './person';
import type { StoredTarget } from './repair-json';
import { Spare } from './spare';
import { Workshop } from './workshop';

/** A pack with a failing module, from its booking to its hand-over. Its steps are not kept: they follow from its rows. */
@Entity({ name: 'repair' })
@Unique('uq_repair_number', ['workshopId', 'number'])
@Index('ix_repair_open', ['workshopId', 'deletedAt', 'archivedAt', 'handedOverAt'])
@Index('uq_repair_spare', ['spareId'], {
  unique: true,
  where: 'spare_id IS NOT NULL AND handed_over_at IS NULL AND deleted_at IS NULL',
})
export class Repair {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_repair_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('number'))
  number!: string;

  @Column(textColumn('vehicle'))
  vehicle!: string;

  @ForeignKey(() => PackType, { name: 'fk_repair_pack_type' })
  @Column(optionalIdColumn('pack_type_id'))
  packTypeId!: string | null;

  @ForeignKey(() => ModuleType, { name: 'fk_repair_module_type' })
  @Column(packColumns.moduleTypeId)
  moduleTypeId!: string | null;

  @Column(packColumns.groupCount)
  groupCount!: number;

  @Column(packColumns.groupsPerModule)
  groupsPerModule!: number;

  @Column(packColumns.positionOfGroup)
  positionOfGroup!: string[] | null;

  @Column(packColumns.bleedAmps)
  bleedAmps!: number | null;

  @Column(packColumns.aimMillivolts)
  aimMillivolts!: number | null;

  @Column(optionalTextColumn('customer_name'))
  customerName!: string | null;

  @Column(optionalTextColumn('customer_contact'))
  customerContact!: string | null;

  @Column(optionalInstantColumn('promised_at'))
  promisedAt!: number | null;

  @Column(optionalTextColumn('bay'))
  bay!: string | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(optionalJsonColumn('target'))
  target!: StoredTarget | null;

  /** The spare reserved for it. */
  @ForeignKey(() => Spare, { name: 'fk_repair_spare' })
  @Column(optionalIdColumn('spare_id'))
  spareId!: string | null;

  @Column(optionalInstantColumn('spare_at'))
  spareAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_repair_spare_by' })
  @Column(optionalIdColumn('spare_by_id'))
  spareById!: string | null;

  @Column(instantColumn('booked_at'))
  bookedAt!: number;

  @ForeignKey(() => Person, { name: 'fk_repair_booked_by' })
  @Column(idColumn('booked_by_id'))
  bookedById!: string;

  @Column(optionalInstantColumn('handed_over_at'))
  handedOverAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_repair_handed_over_by' })
  @Column(optionalIdColumn('handed_over_by_id'))
  handedOverById!: string | null;

  @Column(optionalTextColumn('hand_over_note'))
  handOverNote!: string | null;

  @Column(optionalInstantColumn('archived_at'))
  archivedAt!: number | null;

  @Column(optionalInstantColumn('deleted_at'))
  deletedAt!: number | null;

  @ForeignKey(() => Person, { name: 'fk_repair_deleted_by' })
  @Column(optionalIdColumn('deleted_by_id'))
  deletedById!: string | null;

  @Column(optionalTextColumn('delete_reason'))
  deleteReason!: string | null;

  /** When the customer's name and contact were erased. */
  @Column(optionalInstantColumn('erased_at'))
  erasedAt!: number | null;

  /** A plain column: a foreign key cannot be added without building the table anew. */
  @Column(optionalIdColumn('erased_by_id'))
  erasedById!: string | null;

  @Column(optionalTextColumn('erase_reason'))
  eraseReason!: string | null;

  /** What a search looks in, in lower case: the databases agree on no case but of a–z. */
  @Column(textColumn('search_text'))
  searchText!: string;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
