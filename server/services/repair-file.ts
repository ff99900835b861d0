import type { EntityManager } from 'typeorm';
import type { AdvisedItem } from '../entities/advised-item';
import type { FittedSpare } from '../entities/fitted-spare';
import type { ModuleType } from '../entities/module-type';
import type { PackReading } from '../entities/pack-reading';
import type { Photo } from '../entities/photo';
import type { RemovedModule } from '../entities/removed-module';
import type { Repair } from '../entities/repair';
import type { RepairWait } from '../entities/repair-wait';
import type { SecondSource } from '../entities/second-source';
import type { Spare } from '../entities/spare';
import { notFound } from '../errors/domain-error';
import { sparesById, typesById } from '../repositories/charge-stock.repository';
import { listPackTypes } from '../repositories/pack-types.repository';
import {
  advisedOfRepairs,
  fittedOfRepairs,
  peopleOfRepairs,
  photosOfRepairs,
  readingsOfRepairs,
  removedOfRepairs,
  sourcesOfRepairs,
  waitsOfRepairs,
} from '../repositories/repair-rows.repository';
import { findRepair, fittersOf, listChargesOfRepairs } from '../repositories/repairs.repository';
import { loadBench, loadFiles, type Bench, type ChargeFile } from './charge-file';

/** A repair with the rows that decide its steps and its picture; lists newest first. */
export interface RepairFile extends Bench {
  repair: Repair;
  /** The one who is asked first comes first. */
  personIds: string[];
  readings: PackReading[];
  sources: SecondSource[];
  removed: RemovedModule[];
  /** The first advised first. */
  advised: AdvisedItem[];
  waits: RepairWait[];
  photos: Photo[];
  /** Spares that went in without a charge. */
  fittedAsItIs: FittedSpare[];
  /** The spares that its own rows name, by id; a charge has its own. */
  spares: Map<string, Spare>;
  charges: ChargeFile[];
  /** Who has fitted the module of a charge, by the charge's id. */
  fitters: Map<string, string>;
  packTypeName: string | null;
  /** Type of the pack's modules. */
  type: ModuleType | null;
  /** The spare reserved for it. */
  spare: Spare | null;
}

const given = (ids: readonly (string | null)[]): string[] => [...new Set(ids.filter((id) => id !== null))];

/** Puts the rows of several repairs together, with one query a table. */
export async function loadRepairFiles(
  manager: EntityManager,
  workshopId: string,
  repairs: readonly Repair[],
  bench?: Bench,
): Promise<RepairFile[]> {
  const around = bench ?? (await loadBench(manager, workshopId));
  const ids = repairs.map(({ id }) => id);
  const people = await peopleOfRepairs(manager, workshopId, ids);
  const readings = await readingsOfRepairs(manager, workshopId, ids);
  const sources = await sourcesOfRepairs(manager, workshopId, ids);
  const removed = await removedOfRepairs(manager, workshopId, ids);
  const photos = await photosOfRepairs(manager, workshopId, ids);
  const asItIs = await fittedOfRepairs(manager, workshopId, ids);
  const advised = await advisedOfRepairs(manager, workshopId, ids);
  const waits = await waitsOfRepairs(manager, workshopId, ids);
  const charges = await listChargesOfRepairs(manager, workshopId, ids);
  const chargeFiles = await loadFiles(manager, workshopId, charges, around);
  const fitted = charges.filter(({ stage }) => stage === 'fitted').map(({ id }) => id);
  const fitters = await fittersOf(manager, workshopId, fitted);
  const packTypes = new Map((await listPackTypes(manager, workshopId)).map((type) => [type.id, type.name]));
  const types = await typesById(manager, workshopId, given(repairs.map(({ moduleTypeId }) => moduleTypeId)));
  const spares = await sparesById(
    manager,
    workshopId,
    given([...repairs, ...[...photos.values(), ...asItIs.values()].flat()].map(({ spareId }) => spareId)),
  );
  return repairs.map((repair) => ({
    ...around,
    repair,
    personIds: (people.get(repair.id) ?? []).map(({ personId }) => personId),
    readings: readings.get(repair.id) ?? [],
    sources: sources.get(repair.id) ?? [],
    removed: removed.get(repair.id) ?? [],
    advised: advised.get(repair.id) ?? [],
    waits: waits.get(repair.id) ?? [],
    photos: photos.get(repair.id) ?? [],
    fittedAsItIs: asItIs.get(repair.id) ?? [],
    spares,
    charges: chargeFiles.filter(({ charge }) => charge.repairId === repair.id),
    fitters,
    packTypeName: packTypes.get(repair.packTypeId ?? '') ?? null,
    type: types.get(repair.moduleTypeId ?? '') ?? null,
    spare: spares.get(repair.spareId ?? '') ?? null,
  }));
}

/** @throws DomainError 404 where the workshop has no such repair */
export async function loadRepairFile(manager: EntityManager, workshopId: string, id: string): Promise<RepairFile> {
  const repair = await findRepair(manager, workshopId, id);
  if (!repair) throw notFound('This repair');
  const [file] = await loadRepairFiles(manager, workshopId, [repair]);
  return file!;
}
