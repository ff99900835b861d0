/** The spares that could go into a pack, the soonest at its target first. */
import { setImmediate } from 'node:timers/promises';
import { soonestTerminals, socAtVolts, spareAgreement } from '@/calc/index';
import type { ChannelParameters, PlanInput } from '@/calc/plan-types';
import type { CandidateDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { SpareReading } from '../entities/spare-reading';
import { conflict } from '../errors/domain-error';
import { lastMoves, type SpareMove } from '../repositories/spare-moves.repository';
import { reservationsBySpare } from '../repositories/repairs.repository';
import { lastSpareReadings, listSpares, openChargesBySpare, type SpareCharge } from '../repositories/spares.repository';
import { candidateGround, candidatePlan, candidateState, candidateTarget } from './candidate-plan';
import { titleOf } from './charge-words';
import { toOptionalInstant } from './instants';
import { curveOf, orNull, packCapacityAh } from './pack-numbers';
import { channelsFor } from './plan-inputs';
import { loadRepairFile } from './repair-file';
import { usedCapacity } from './spare-capacity';

/** Spares reckoned before others get their turn. */
const AT_ONCE = 20;

/** What one reading of one module gives: two spares that read alike are reckoned once. */
interface Reckoned {
  seconds: CandidateDto['seconds'];
  channelName: string | null;
  needsCharge: boolean;
  problems: string[];
  ruledOut: boolean;
}

/**
 * Candidates of the pack's module type by their likely time to the target: through the terminals of the best channel, rest
 * and check included. What cannot be planned stands last, with the reason.
 * @throws DomainError 404 unknown, 409 where the pack has no module type
 */
export async function candidates(deps: Deps, member: Member, id: string, now: number): Promise<CandidateDto[]> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const file = await loadRepairFile(manager, workshopId, id);
  const { type, meters } = file;
  if (type === null)
    throw conflict(
      'no_type',
      `The pack of ${file.repair.number} has no module type yet. Choose one: it says which spares fit.`,
    );
  const target = candidateTarget(file, type, now);
  const readings = await lastSpareReadings(manager, workshopId);
  const charges = await openChargesBySpare(manager, workshopId);
  const moves = await lastMoves(manager, workshopId);
  const reservations = await reservationsBySpare(manager, workshopId);
  const bench = await channelsFor(manager, workshopId, { id: '', moduleTypeId: type.id }, false, meters, now);
  const channels = distinct(bench.channels);
  const ground = target === null ? null : candidateGround(file, type, target, channels, now);
  const known = new Map<string, Reckoned>();

  const reckon = (spare: Spare, reading: SpareReading): Reckoned => {
    if (ground === null) return { seconds: null, channelName: null, needsCharge: true, problems: [], ruledOut: false };
    const state = candidateState(spare, type, reading, meters, now);
    const key = JSON.stringify(state);
    const before = known.get(key);
    if (before) return before;
    const found = reckoned(candidatePlan(ground, state, reading));
    known.set(key, found);
    return found;
  };

  const spares = (await listSpares(manager, workshopId)).filter(
    ({ moduleTypeId, fittedAt }) => moduleTypeId === type.id && fittedAt === null,
  );
  const dtoOf = (spare: Spare): CandidateDto => {
    const reading = readings.get(spare.id);
    const reservation = reservations.get(spare.id);
    const reservedFor = reservation === undefined ? null : { repairId: reservation.id, number: reservation.number };
    const elsewhere = [
      ...(reservedFor !== null && reservedFor.repairId !== id ? [`Reserved for ${reservedFor.number}.`] : []),
      ...whyNot(spare, reading, charges.get(spare.id), moves.get(spare.id)),
    ];
    const found = elsewhere.length > 0 || reading === undefined ? null : reckon(spare, reading);
    const { capacityAh, source } = usedCapacity(spare, type);
    return {
      spareId: spare.id,
      label: spare.label,
      shelfPlace: spare.shelfPlace,
      groupVolts: reading?.groupVolts ?? null,
      readAt: toOptionalInstant(reading?.at ?? null),
      usedCapacityAh: capacityAh,
      capacitySource: source,
      seconds: found?.seconds ?? null,
      channelName: found?.channelName ?? null,
      needsCharge: found?.needsCharge ?? true,
      problems: found?.problems ?? elsewhere,
      ruledOut: found?.ruledOut ?? true,
      reservedFor,
      agreement: target === null ? null : agreementOf(type, capacityAh, target.volts),
    };
  };
  const listed: CandidateDto[] = [];
  for (const [place, spare] of spares.entries()) {
    listed.push(dtoOf(spare));
    // Two hundred spares are some tenths of a second of reckoning: sockets and other questions get their turn in between.
    if (place % AT_ONCE === AT_ONCE - 1) await setImmediate();
  }
  return listed.sort(
    (one, other) =>
      Number(one.ruledOut) - Number(other.ruledOut) ||
      (one.seconds?.p50 ?? Infinity) - (other.seconds?.p50 ?? Infinity) ||
      one.label.localeCompare(other.label, 'en', { numeric: true }),
  );
}

/** Why a spare is not to be had, whatever its numbers; empty: it is. */
export function whyNot(
  spare: Spare,
  reading: SpareReading | undefined,
  charge: SpareCharge | undefined,
  move: SpareMove | undefined,
): string[] {
  const found: string[] = [];
  if (charge) found.push(`It is on ${titleOf(charge)}.`);
  if (!reading) found.push('It has no reading. Read its groups first.');
  else if (!charge && move && move.until > reading.at) {
    const where = move.asNeighbour ? 'joined to another spare for' : 'on';
    found.push(`It has been ${where} ${titleOf(move.charge)} since its last reading. Read its groups first.`);
  }
  return found;
}

function reckoned(input: PlanInput): Reckoned {
  const { option, alreadyWithin, refusals, reason, cautions } = soonestTerminals(input);
  const out = (problems: string[]): Reckoned => ({
    ...{ seconds: null, channelName: null, needsCharge: true, problems, ruledOut: true },
  });
  if (refusals.length > 0) return out(refusals.map(({ text }) => text));
  if (alreadyWithin) {
    const problems = cautions.map(({ text }) => text);
    return { seconds: { p10: 0, p50: 0, p90: 0 }, channelName: null, needsCharge: false, problems, ruledOut: false };
  }
  if (option === null) return out([reason ?? 'No channel can bring it there.']);
  const apart = option.apart === null ? [] : [option.apart];
  return {
    seconds: option.totalS,
    channelName: input.channels.find(({ channelId }) => channelId === option.channelIds[0])?.name ?? null,
    needsCharge: true,
    problems: [...apart, ...cautions].map(({ text }) => text),
    ruledOut: false,
  };
}

/** Of channels that are alike but for their name, the one that is free first. */
export function distinct(channels: readonly ChannelParameters[]): ChannelParameters[] {
  const first = new Map<string, ChannelParameters>();
  for (const channel of channels) {
    const { channelId: _id, name: _name, freeInS, ...kind } = channel;
    const key = JSON.stringify(kind);
    const other = first.get(key);
    if (!other || freeInS < other.freeInS) first.set(key, channel);
  }
  return [...first.values()];
}

/** How far a spare lies from its neighbours at full and at low charge, matched at the target. */
export function agreementOf(type: ModuleType, spareAh: number, targetVolts: number): CandidateDto['agreement'] {
  const curve = curveOf(type);
  const found = orNull(() =>
    spareAgreement({
      spareAh,
      neighboursAh: packCapacityAh(type),
      matchSoc: Math.min(1, Math.max(0, socAtVolts(curve, targetVolts))),
      curve,
    }),
  );
  if (found === null) return null;
  return {
    fullMillivolts: found.atFullVolts * 1000,
    lowMillivolts: found.atLowVolts * 1000,
    bestMatchPercent: found.bestMatchSoc * 100,
  };
}
