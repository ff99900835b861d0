/**
 * From the rows of a workshop to what the planner takes. Used for a plan that is only looked at and for one that is
 * kept as a charge, so that both see the same numbers.
 */
import type { EntityManager } from 'typeorm';
import { chemistryParameters, planCharge, voltsAtSoc } from '@/calc/index';
import type { ModuleParameters, PlanInput, RuledOutWay } from '@/calc/plan-types';
import type { PlanDto, PlanRequest } from '@/shared/contract/plan';
import type { FrozenInputs } from '../entities/charge-json';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { listChannels, listUsableChannels } from '../repositories/chargers.repository';
import { listMeters } from '../repositories/meters.repository';
import { findModuleType } from '../repositories/module-types.repository';
import { listOpenHolds } from '../repositories/open-holds.repository';
import { listResistors } from '../repositories/resistors.repository';
import { lastMoveOf } from '../repositories/spare-moves.repository';
import { findLastSpareReading, findSpare } from '../repositories/spares.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { channelHolders } from './channel-availability';
import { faultWords, isFaulty } from './channel-fault';
import { titleOf } from './charge-words';
import { toInstant } from './instants';
import { learnedByCharger } from './learned-factors';
import { correctedVolt, meterOffsetSdVolts } from './meter-trust';
import { neighbourFor } from './neighbour-for';
import {
  channelParameters,
  moduleParameters,
  resistorParameters,
  spareState,
  workshopParameters,
} from './plan-parameters';
import { closesInSeconds } from './working-hours';

/** The shop's temperature where nobody has read the module's, °C. A guess. */
export const ROOM_CELSIUS = 20;

/**
 * One set of draws for every plan: two plans then differ by their numbers alone, not by their dice, and the same spare
 * with the same reading gives the same band to the last digit, whoever plans and when.
 */
export const PLAN_SEED = 20_260_609;

export interface PlanInputs {
  input: PlanInput;
  /** What a charge keeps of it. */
  frozen: FrozenInputs;
  /** The target as it was typed, the meter's offset still in it; of a state of charge its volts. */
  typedVolts: number;
  /** The spare that a resistor would join to this one. */
  neighbourSpareId: string | null;
  /** Names of the channels in the plan, and from when each is free, by id. */
  channelNames: PlanDto['channels'];
  /** Channels left out because nobody can say when they are free. */
  blockedChannels: RuledOutWay[];
  spare: Spare;
  type: ModuleType;
  reading: SpareReading;
  clipOnAt: number;
  readyBy: number | null;
  toleranceMillivolts: number;
}

/**
 * Gathers and checks what a plan needs.
 *
 * Meters' known offsets are taken off spare and target. A channel in use is offered from the likely end of its
 * charge's current; channels of this spare's own charge count as free, as it is being planned again.
 *
 * @param now epoch ms; 0 s of the plan
 * @throws DomainError 404 unknown spare, 409 the spare is fitted, 400 with the field at fault
 */
export async function buildPlanInputs(
  manager: EntityManager,
  workshopId: string,
  request: PlanRequest,
  now: number,
): Promise<PlanInputs> {
  const workshop = await workshopForPlans(manager, workshopId);
  const { spare, type, reading } = await plannedSpare(manager, workshopId, request.spareId);
  const meters = new Map((await listMeters(manager, workshopId)).map((meter) => [meter.id, meter]));
  const packMeter = packMeterOf(request, meters);
  const spareMeter = meters.get(reading.meterId ?? '') ?? null;
  const clipOnAt = request.clipOnAt === null ? now : Math.max(now, Date.parse(request.clipOnAt));
  const readyBy = request.readyBy === null ? null : Date.parse(request.readyBy);
  if (readyBy !== null && readyBy <= now) throw invalid({ readyBy: 'This time has passed. Type a later one.' });

  const spareNow = spareState(spare, type, reading, spareMeter, now);
  const module = moduleParameters(type);
  const soc = typeof request.targetSoc === 'number' ? request.targetSoc / 100 : null;
  const typedVolts = request.targetVolts ?? voltsOf(module, soc);
  const targetVolts = soc === null ? correctedVolt(typedVolts, packMeter) : typedVolts;
  const toleranceMillivolts = request.toleranceMillivolts ?? workshop.toleranceMillivolts;
  const bench = await channelsFor(manager, workshopId, spare, request.withoutLearned === true, meters, now);
  const meterVolts = meterOffsetSdVolts(
    [packMeter, spareMeter].filter((meter) => meter !== null),
    now,
  );
  const spreads = meterVolts === undefined ? {} : { spreads: { meterVolts } };
  const neighbour = await neighbourFor(
    manager,
    workshopId,
    { spare, type, spareVolts: spareNow.groupVolts, targetVolts },
    meters,
    now,
  );
  const frozen: FrozenInputs = {
    ...spreads,
    module,
    spare: spareNow,
    target: {
      volts: targetVolts,
      ...(soc === null ? {} : { soc }),
      toleranceVolts: toleranceMillivolts / 1000,
      meterId: request.meterId,
      celsius: request.packCelsius,
      sdVolts: null,
    },
    channels: bench.channels,
    resistors: (await listResistors(manager, workshopId)).map(resistorParameters),
    neighbour: neighbour?.state ?? null,
    workshop: workshopParameters(workshop, closesInSeconds(workshop, now, clipOnAt)),
    celsius: spareNow.celsius ?? ROOM_CELSIUS,
    seed: PLAN_SEED,
    lagLimitVolts: workshop.lagLimitMillivolts / 1000,
    spareReadAt: reading.at,
  };
  return {
    input: {
      module: frozen.module,
      spare: frozen.spare,
      target: frozen.target,
      channels: frozen.channels,
      resistors: frozen.resistors,
      neighbour: frozen.neighbour,
      workshop: frozen.workshop,
      celsius: frozen.celsius,
      seed: frozen.seed,
      readyByS: readyBy === null ? null : (readyBy - now) / 1000,
      clipOnAtS: (clipOnAt - now) / 1000,
      acceptWideBand: request.acceptWideBand === true,
      ...spreads,
    },
    frozen,
    typedVolts,
    neighbourSpareId: neighbour?.spareId ?? null,
    channelNames: bench.names,
    blockedChannels: bench.blocked,
    spare,
    type,
    reading,
    clipOnAt,
    readyBy,
    toleranceMillivolts,
  };
}

/**
 * Plans a spare: every way, finish and channel with its band. Nothing is stored.
 * @throws DomainError as buildPlanInputs
 */
export async function planFor(
  manager: EntityManager,
  workshopId: string,
  request: PlanRequest,
  now: number,
): Promise<PlanInputs & { dto: PlanDto }> {
  const inputs = await buildPlanInputs(manager, workshopId, request, now);
  const plan = planCharge(inputs.input);
  return {
    ...inputs,
    dto: {
      plan: { ...plan, ruledOut: [...plan.ruledOut, ...inputs.blockedChannels] },
      plannedAt: toInstant(now),
      clipOnAt: toInstant(inputs.clipOnAt),
      targetVolts: inputs.frozen.target.volts,
      toleranceMillivolts: inputs.toleranceMillivolts,
      channels: inputs.channelNames,
    },
  };
}

/** Rest voltage of a state of charge on the type's curve, V, to the tenth of a millivolt. */
function voltsOf({ curve, chemistry }: ModuleParameters, soc: number | null): number {
  return Math.round(voltsAtSoc(curve ?? chemistryParameters(chemistry).curve, soc ?? 0) * 1e4) / 1e4;
}

async function plannedSpare(
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<{ spare: Spare; type: ModuleType; reading: SpareReading }> {
  const spare = await findSpare(manager, workshopId, spareId);
  if (!spare) throw notFound('This spare');
  if (spare.fittedAt !== null)
    throw conflict('spare_fitted', `${spare.label} was fitted and is no longer in stock. Take another spare.`);
  const type = await findModuleType(manager, workshopId, spare.moduleTypeId);
  if (!type) throw notFound('The type of this spare');
  const reading = await findLastSpareReading(manager, workshopId, spare.id);
  if (!reading) throw invalid({ spareId: `${spare.label} has no reading. Read its groups first.` });
  // What a charge has brought in since is only reckoned; planned from the old reading it would be brought in twice.
  const moved = await lastMoveOf(manager, workshopId, spare.id);
  if (moved !== null && moved.until > reading.at) {
    const where = moved.asNeighbour ? 'joined to another spare for' : 'on';
    throw invalid({
      spareId: `${spare.label} has been ${where} ${titleOf(moved.charge)} since its last reading. Read its groups first.`,
    });
  }
  return { spare, type, reading };
}

function packMeterOf(request: PlanRequest, meters: ReadonlyMap<string, Meter>): Meter | null {
  if (request.meterId === null) return null;
  const meter = meters.get(request.meterId);
  if (!meter) throw invalid({ meterId: 'This meter is not on the list. Choose another.' });
  return meter;
}

/**
 * The channels that a plan may use, each from when it is free; those of the spare's own charge count as free.
 * @param spare whose plan it is; an id of none where it is about a whole type
 */
export async function channelsFor(
  manager: EntityManager,
  workshopId: string,
  spare: Pick<Spare, 'id' | 'moduleTypeId'>,
  withoutLearned: boolean,
  meters: ReadonlyMap<string, Meter>,
  now: number,
): Promise<{ channels: FrozenInputs['channels']; names: PlanDto['channels']; blocked: RuledOutWay[] }> {
  const holds = (await listOpenHolds(manager, workshopId)).filter(({ charge }) => charge.spareId !== spare.id);
  const holders = channelHolders(holds, now);
  const channels: FrozenInputs['channels'] = [];
  const names: PlanDto['channels'] = {};
  const blocked: RuledOutWay[] = [];
  const chargerOf = new Map((await listChannels(manager, workshopId)).map(({ id, chargerId }) => [id, chargerId]));
  const learned = await learnedByCharger(manager, workshopId, spare.moduleTypeId, chargerOf);
  for (const { channel, charger } of await listUsableChannels(manager, workshopId)) {
    if (isFaulty(channel)) {
      blocked.push({
        way: 'terminals',
        finish: 'over-and-settle',
        channelId: channel.id,
        channelName: channel.name,
        reason: `${faultWords(channel)} It is offered again once somebody has said that it works.`,
      });
      continue;
    }
    const holder = holders.get(channel.id);
    if (holder?.freeAt === null) {
      blocked.push({
        way: 'terminals',
        finish: 'over-and-settle',
        channelId: channel.id,
        channelName: channel.name,
        reason: `${channel.name} is taken by ${titleOf(holder.charge)}, which is held. Resume or stop it to free the channel.`,
      });
      continue;
    }
    const freeAt = holder?.freeAt ?? now;
    names[channel.id] = {
      name: channel.name,
      chargerName: charger.name,
      freeAt: freeAt > now ? toInstant(freeAt) : null,
    };
    const meter = meters.get(charger.meterId ?? '') ?? null;
    channels.push(
      channelParameters(channel, meter, (freeAt - now) / 1000, now, withoutLearned ? null : learned.get(charger.id)),
    );
  }
  return { channels, names, blocked };
}
