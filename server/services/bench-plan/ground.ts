/** Everything the bench plan of a workshop stands on, read once: charges, channels, people, repairs and other work. */
import type { EntityManager } from 'typeorm';
import type { Channel } from '../../entities/channel';
import type { Place } from '../../entities/place';
import type { Repair } from '../../entities/repair';
import type { RepairWait } from '../../entities/repair-wait';
import type { Work } from '../../entities/work';
import type { WorkStint } from '../../entities/work-stint';
import type { Workshop } from '../../entities/workshop';
import { listChargesSince, listWaitsSince, repairsById } from '../../repositories/bench-ground.repository';
import { listUsableChannels } from '../../repositories/chargers.repository';
import { peopleOfRepairs } from '../../repositories/repair-rows.repository';
import { loadBench, loadFiles, type ChargeFile } from '../charge-file';
import { startOfDay, type Days } from './days';
import { groundPeople, type GroundPerson } from './ground-people';

/** Hours and plans are looked at this far ahead, ms. */
export const HORIZON_MS = 7 * 24 * 3_600_000;

export interface GroundRepair {
  repair: Repair;
  /** Those who work on it and are not disabled; the one who is asked first comes first. */
  personIds: string[];
}

export interface BenchGround {
  workshopId: string;
  now: number;
  days: Days;
  workshop: Workshop;
  /** Open charges, and those that were over since the first day. */
  files: ChargeFile[];
  channels: Channel[];
  people: GroundPerson[];
  /** By id: of the charges, and those that wait. */
  repairs: Map<string, GroundRepair>;
  /** Of today, and since the first day. */
  waits: RepairWait[];
  /** Stints that reach into the days or the time to come, but those given back. */
  stints: WorkStint[];
  /** Open work, and what those stints are of, by id. */
  work: Map<string, Work>;
  places: Map<string, Place>;
}

export async function loadGround(
  manager: EntityManager,
  workshopId: string,
  days: Days,
  now: number,
): Promise<BenchGround> {
  const bench = await loadBench(manager, workshopId);
  const { workshop } = bench;
  const since = Math.min(days.from, startOfDay(workshop.zone, now));
  const until = Math.max(days.to, now + HORIZON_MS);
  const files = await loadFiles(manager, workshopId, await listChargesSince(manager, workshopId, since), bench);
  const waits = await listWaitsSince(manager, workshopId, since);
  const staff = await groundPeople(manager, bench, { from: since, to: until });
  const named = [
    ...files.map(({ charge }) => charge.repairId),
    ...waits.map(({ repairId }) => repairId),
    ...[...staff.work.values()].map(({ repairId }) => repairId),
  ];
  const rows = await repairsById(manager, workshopId, [...new Set(named.filter((id) => id !== null))]);
  const onRepairs = await peopleOfRepairs(manager, workshopId, [...rows.keys()]);
  const able = (id: string): boolean => bench.people.get(id)?.disabledAt === null;
  const repairs = new Map(
    [...rows].map(([id, repair]) => [
      id,
      { repair, personIds: (onRepairs.get(id) ?? []).map(({ personId }) => personId).filter(able) },
    ]),
  );
  return {
    ...{ workshopId, now, days, workshop, files, repairs, waits },
    channels: (await listUsableChannels(manager, workshopId)).map(({ channel }) => channel),
    ...staff,
  };
}

/** Whose charge it is: its own person, else the first of its repair's; null: nobody's who is here still. */
export function ownerOf({ people, repairs }: BenchGround, { charge }: Pick<ChargeFile, 'charge'>): string | null {
  const here = new Set(people.map(({ id }) => id));
  if (charge.personId !== null && here.has(charge.personId)) return charge.personId;
  return repairs.get(charge.repairId ?? '')?.personIds.find((id) => here.has(id)) ?? null;
}

/** A charge that begun, or has a time to begin at. A plan whose time has passed without anybody queuing it has none. */
export const hasTime = ({ charge }: Pick<ChargeFile, 'charge'>, now: number): boolean =>
  charge.stage !== 'planned' || charge.clipOnAt >= now;

/** When a charge is due: its own wish, else what its repair was promised for; null: whenever. */
export const dueOf = ({ repairs }: BenchGround, { charge }: Pick<ChargeFile, 'charge'>): number | null =>
  charge.readyBy ?? repairs.get(charge.repairId ?? '')?.repair.promisedAt ?? null;
