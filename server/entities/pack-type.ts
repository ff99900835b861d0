import { Column, Entity, ForeignKey, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalRealColumn, optionalTextColumn, textColumn, wholeColumn } from './columns';
import { ModuleType } from './module-type';
import { packColumns } from './pack-columns';
import { Workshop } from './workshop';

/** A pack as the workshop meets it again and again: a template for the packs of repairs. */
@Entity({ name: 'pack_type' })
@Unique('uq_pack_type_name', ['workshopId', 'name'])
export class PackType {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_pack_type_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @Column(textColumn('name'))
  name!: string;

  @ForeignKey(() => ModuleType, { name: 'fk_pack_type_module_type' })
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

  /** Rest voltage per group with which such packs usually arrive, V; null: as the workshop's own arrivals tell. */
  @Column(optionalRealColumn('usual_arrival_volts'))
  usualArrivalVolts!: number | null;

  @Column(optionalTextColumn('note'))
  note!: string | null;

  @Column(wholeColumn('rev'))
  rev!: number;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
