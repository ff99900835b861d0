import type { EntityManager } from 'typeorm';
import type { StartNowDto } from '@/shared/contract/bench-plan';
import type { Deps, Member } from '../../deps';
import type { Spare } from '../../entities/spare';
import { listTargets } from '../../repositories/bench-ground.repository';
import { listPackTypes } from '../../repositories/pack-types.repository';
import { listOpenRepairs, reservationsBySpare } from '../../repositories/repairs.repository';
import { lastMoves } from '../../repositories/spare-moves.repository';
import { lastSpareReadings, listSpares, openChargesBySpare } from '../../repositories/spares.repository';
import { candidateGround, candidatePlan, candidateState, candidateTarget } from '../candidate-plan';
import { distinct, whyNot } from '../candidates.service';
import { channelsFor } from '../plan-inputs';
import { repairFacts } from '../repair-facts';
import { loadRepairFiles, type RepairFile } from '../repair-file';
import type { EarlyStart } from './bench-tasks';
import { usualArrival, type UsualArrival } from './usual-arrival';

/** Less is not worth a walk to the shelf, s. */
const LEAST_SAVED_S = 600;
/** Past repairs that tell how packs arrive. */
const PAST_REPAIRS = 200;

interface Shelf {
  spares: Spare[];
  readings: Awaited<ReturnType<typeof lastSpareReadings>>;
  /** Spares that a repair has reserved, by id. */
  reserved: Awaited<ReturnType<typeof reservationsBySpare>>;
}

/**
 * Booked repairs whose pack nobody has read yet, with the spare that can be brought close meanwhile: what it takes now,
 * what is left to wait for afterwards, and how much less that is. The one that was booked first chooses first.
 */
export async function startNow(deps: Deps, member: Member, now: number): Promise<StartNowDto[]> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const open = await listOpenRepairs(manager, workshopId);
  const booked = open.filter(({ target, moduleTypeId }) => target === null && moduleTypeId !== null);
  const files = (await loadRepairFiles(manager, workshopId, booked)).filter((file) => isUnread(file, now));
  if (files.length === 0) return [];
  const past = await listTargets(manager, workshopId, PAST_REPAIRS);
  const types = new Map((await listPackTypes(manager, workshopId)).map((type) => [type.id, type]));
  const shelf = await shelfOf(manager, workshopId);
  const taken = new Set<string>();
  const found: StartNowDto[] = [];
  for (const file of files) {
    const usual = usualArrival(file.repair, types.get(file.repair.packTypeId ?? '') ?? null, past);
    const one = usual === null ? null : await startOf(deps, file, usual, shelf, taken, now);
    if (one === null) continue;
    taken.add(one.spare.id);
    found.push(one);
  }
  return found;
}

/** Neither read nor charged for: what is known of its pack is only what is usual. */
const isUnread = (file: RepairFile, now: number): boolean =>
  file.type !== null && candidateTarget(file, file.type, now) === null && repairFacts(file).open === null;

async function shelfOf(manager: EntityManager, workshopId: string): Promise<Shelf> {
  const readings = await lastSpareReadings(manager, workshopId);
  const charges = await openChargesBySpare(manager, workshopId);
  const moves = await lastMoves(manager, workshopId);
  const spares = (await listSpares(manager, workshopId)).filter(
    (spare) =>
      spare.fittedAt === null &&
      whyNot(spare, readings.get(spare.id), charges.get(spare.id), moves.get(spare.id)).length === 0,
  );
  return { spares, readings, reserved: await reservationsBySpare(manager, workshopId) };
}

async function startOf(
  deps: Deps,
  file: RepairFile,
  usual: UsualArrival,
  shelf: Shelf,
  taken: ReadonlySet<string>,
  now: number,
): Promise<StartNowDto | null> {
  const { repair, workshop, meters } = file;
  const type = file.type!;
  const { channels, names } = await channelsFor(
    deps.dataSource.manager,
    repair.workshopId,
    { id: '', moduleTypeId: type.id },
    false,
    meters,
    now,
  );
  const target = {
    volts: usual.volts,
    toleranceMillivolts: workshop.toleranceMillivolts,
    meterId: null,
    celsius: null,
  };
  const today = candidateGround(file, type, target, wholeMinutes(distinct(channels)), now);
  // When somebody closes says nothing of how long it takes, and would make every question a new one.
  const ground = { ...today, workshop: { ...today.workshop, closesInS: null } };
  const spares = shelf.spares.filter(({ id, moduleTypeId }) => {
    const reservation = shelf.reserved.get(id);
    const own = repair.spareId === null ? reservation === undefined : repair.spareId === id;
    return moduleTypeId === type.id && own && !taken.has(id);
  });
  const asks = spares.map(({ id, ...spare }): EarlyStart => {
    const reading = shelf.readings.get(id)!;
    const state = candidateState({ id, ...spare }, type, reading, meters, now);
    return { spareId: id, start: candidatePlan(ground, state, reading), arrivals: usual.likely };
  });
  const found = await deps.bench.earlyStarts(asks);
  const withoutS = Math.min(...found.map((one) => one.withoutS));
  const best = found.filter(({ channelId }) => channelId !== null).sort((a, b) => a.takesS.p50 - b.takesS.p50)[0];
  if (!best || withoutS - best.thenS < LEAST_SAVED_S) return null;
  const spare = spares.find(({ id }) => id === best.spareId)!;
  return {
    repairId: repair.id,
    number: repair.number,
    vehicle: repair.vehicle,
    typeName: file.packTypeName ?? type.name,
    usualVolts: usual.volts,
    arrivals: usual.arrivals,
    aimVolts: best.aimVolts,
    spare: { id: spare.id, label: spare.label, shelfPlace: spare.shelfPlace },
    channelName: names[best.channelId!]?.name ?? '',
    takes: { p10S: best.takesS.p10, p50S: best.takesS.p50, p90S: best.takesS.p90 },
    thenS: best.thenS,
    savesS: withoutS - best.thenS,
  };
}

/** Free times by the minute, so that the same question within it is answered once. */
const wholeMinutes = <Channel extends { freeInS: number }>(channels: readonly Channel[]): Channel[] =>
  channels.map((channel) => ({ ...channel, freeInS: Math.ceil(channel.freeInS / 60) * 60 }));
