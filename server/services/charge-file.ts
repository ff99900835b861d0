import type { EntityManager } from 'typeorm';
import type { Stage } from '@/shared/contract/charge';
import type { Channel } from '../entities/channel';
import type { ChannelHold } from '../entities/channel-hold';
import type { Charge } from '../entities/charge';
import type { ChargeReading } from '../entities/charge-reading';
import type { LookIn } from '../entities/look-in';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { RestCheck } from '../entities/rest-check';
import type { RunStretch } from '../entities/run-stretch';
import type { Spare } from '../entities/spare';
import type { Workshop } from '../entities/workshop';
import { notFound } from '../errors/domain-error';
import { holdsOf, lookInsOf, readingsOf, restChecksOf, runsOf } from '../repositories/charge-rows.repository';
import {
  channelsById,
  findWorkshop,
  peopleById,
  sparesById,
  typesById,
  type PersonName,
} from '../repositories/charge-stock.repository';
import { findCharge } from '../repositories/charges.repository';
import { listMeters } from '../repositories/meters.repository';

/** What all charges of a workshop have around them. */
export interface Bench {
  workshop: Workshop;
  people: Map<string, PersonName>;
  channels: Map<string, Channel>;
  meters: Map<string, Meter>;
}

/** A charge with the rows that decide its stage and its picture. */
export interface ChargeFile extends Bench {
  charge: Charge;
  /** The stage it was read with; an act may set another. */
  storedStage: Stage;
  spare: Spare;
  type: ModuleType;
  holds: ChannelHold[];
  runs: RunStretch[];
  readings: ChargeReading[];
  lookIns: LookIn[];
  restChecks: RestCheck[];
}

export async function loadBench(manager: EntityManager, workshopId: string): Promise<Bench> {
  const workshop = await findWorkshop(manager, workshopId);
  if (!workshop) throw notFound('This workshop');
  return {
    workshop,
    people: await peopleById(manager, workshopId),
    channels: await channelsById(manager, workshopId),
    meters: new Map((await listMeters(manager, workshopId)).map((meter) => [meter.id, meter])),
  };
}

/** Puts the rows of several charges together, with one query a table. */
export async function loadFiles(
  manager: EntityManager,
  workshopId: string,
  charges: readonly Charge[],
  bench?: Bench,
): Promise<ChargeFile[]> {
  const around = bench ?? (await loadBench(manager, workshopId));
  const ids = charges.map((charge) => charge.id);
  const spares = await sparesById(manager, workshopId, [...new Set(charges.map((charge) => charge.spareId))]);
  const types = await typesById(manager, workshopId, [...new Set(charges.map((charge) => charge.moduleTypeId))]);
  const holds = await holdsOf(manager, workshopId, ids);
  const runs = await runsOf(manager, workshopId, ids);
  const readings = await readingsOf(manager, workshopId, ids);
  const lookIns = await lookInsOf(manager, workshopId, ids);
  const restChecks = await restChecksOf(manager, workshopId, ids);
  return charges.map((charge) => {
    const spare = spares.get(charge.spareId);
    const type = types.get(charge.moduleTypeId);
    if (!spare || !type) throw new Error(`Charge ${charge.id} has lost its spare or its type.`);
    return {
      ...around,
      charge,
      storedStage: charge.stage,
      spare,
      type,
      holds: holds.get(charge.id) ?? [],
      runs: runs.get(charge.id) ?? [],
      readings: readings.get(charge.id) ?? [],
      lookIns: lookIns.get(charge.id) ?? [],
      restChecks: restChecks.get(charge.id) ?? [],
    };
  });
}

/** @throws DomainError 404 where the workshop has no such charge */
export async function loadFile(manager: EntityManager, workshopId: string, id: string): Promise<ChargeFile> {
  const charge = await findCharge(manager, workshopId, id);
  if (!charge) throw notFound('This charge');
  const [file] = await loadFiles(manager, workshopId, [charge]);
  return file!;
}
