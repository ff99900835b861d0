import type { EntityManager } from 'typeorm';
import type {
  ChargeCardDto,
  ChargeDto,
  ChargeEventDto,
  InstantBand,
  OddDto,
  ReadingDto,
  RestCheckDto,
  RestDto,
} from '@/shared/contract/charge';
import { can } from '@/shared/contract/roles';
import type { Config } from '../config';
import type { Member } from '../deps';
import type { ChargeEvent } from '../entities/charge-event';
import type { ChargeReading } from '../entities/charge-reading';
import type { RestCheck } from '../entities/rest-check';
import { answersOf, eventsOf } from '../repositories/charge-rows.repository';
import { chargeNames, findTopUpOf, type ChargeName } from '../repositories/charges.repository';
import { personRef } from './alert-dto';
import { channelsOf, faultDto } from './channel-fault';
import { checkSheet } from './charge-checks';
import { chargeNow, instantOf, readingInstantOf } from './charge-clock';
import { overdueSince } from './charge-due';
import type { ChargeFile } from './charge-file';
import { nextLookIn } from './charge-look-ins';
import { reckonTo } from './charge-progress';
import { validReadings } from './charge-reckoning';
import { timedSegments, waitShiftMs } from './charge-segments';
import { isOpen, isRunning, isUnderWay, isWaitingToStart, swapWait } from './charge-stages';
import { channelNamesOf, handText } from './charge-steps';
import { listText, titleOf } from './charge-words';
import { startBlock } from './start-block';
import { toInstant, toOptionalInstant } from './instants';

/** A page that shows one charge shows it as it stands now, not as it stood when somebody last did something, ms. */
const FRESH_MS = 15_000;

const band = (early: number | null, likely: number | null, late: number | null, shift = 0): InstantBand | null =>
  early === null || likely === null || late === null
    ? null
    : { early: toInstant(early + shift), likely: toInstant(likely + shift), late: toInstant(late + shift) };

/** When it will be ready, as known at `now`; null where it is, or where it waits for a person's check. */
function readyBand(file: ChargeFile, now: number): InstantBand | null {
  const { charge } = file;
  if (isWaitingToStart(charge.stage))
    return band(charge.plannedEarlyAt, charge.plannedLikelyAt, charge.plannedLateAt, waitShiftMs(file, now));
  if (charge.stage === 'held' || charge.stage === 'resting' || isRunning(charge.stage))
    return band(charge.earlyAt, charge.likelyAt, charge.lateAt, waitShiftMs(file, now));
  return null;
}

/** The check whose numbers stand for the groups: the last one, where nothing has flowed since. */
function standingCheck({ charge, restChecks }: ChargeFile): RestCheck | null {
  const last = restChecks.at(-1) ?? null;
  return last !== null && last.at >= (charge.currentEndAt ?? 0) && !isRunning(charge.stage) ? last : null;
}

function groupsOf(file: ChargeFile): ChargeCardDto['groups'] {
  const { charge } = file;
  const from = charge.frozen.spare.groupVolts;
  const check = standingCheck(file);
  if (check !== null)
    return check.verdict.groups.map(({ volts, group }) => ({
      volts,
      reckoned: false,
      fromVolts: from[group] ?? volts,
      clipVolts: null,
    }));
  const reckoned = charge.reckoning?.reckoning.groups;
  if (charge.startedAt === null || !reckoned)
    return from.map((volts) => ({ volts, reckoned: false, fromVolts: volts, clipVolts: null }));
  const flows = isRunning(charge.stage) && swapWait(file) === null;
  return reckoned.map((group, index) => ({
    volts: group.restVolts,
    reckoned: true,
    fromVolts: from[index] ?? group.restVolts,
    clipVolts: flows ? group.clipVolts : null,
  }));
}

function nextHand(file: ChargeFile): string | null {
  const { charge } = file;
  const swap = swapWait(file);
  if (swap !== null) return handText(file, swap.stepIndex);
  if (charge.stage !== 'resting' || charge.currentOffSaid) return null;
  const names = channelNamesOf(file, charge.option.steps.length - 1);
  return names.length === 0 ? 'Take the resistor off' : `Switch ${listText(names)} off`;
}

/** Channels the charge is at: of the step under way, or of all it will need. */
function cardChannels(file: ChargeFile): string[] {
  const { charge, channels } = file;
  const running = isUnderWay(charge.stage) || charge.stage === 'ready';
  if (running) return channelNamesOf(file, charge.reckoning?.reckoning.stepIndex ?? 0);
  return [...new Set(charge.option.channelIds)].map((id) => channels.get(id)?.name ?? 'gone');
}

/** A charge as board, bench, wall and lists show it. */
export function chargeCard(file: ChargeFile, now: number): ChargeCardDto {
  const { charge, spare, type, people } = file;
  const reckoning = charge.reckoning?.reckoning ?? null;
  const live = isRunning(charge.stage) || charge.stage === 'held' || charge.stage === 'resting';
  const late = overdueSince(file, now);
  return {
    id: charge.id,
    number: charge.number,
    title: titleOf(charge),
    repairRef: charge.repairRef,
    modulePosition: charge.modulePosition,
    spare: { id: spare.id, label: spare.label },
    typeName: type.name,
    chargeLimitVolts: charge.frozen.module.chargeLimitVolts,
    dischargeLimitVolts: charge.frozen.module.dischargeLimitVolts,
    channelNames: cardChannels(file),
    person: personRef(people, charge.personId),
    stage: charge.stage,
    heldFrom: charge.heldFrom,
    direction: charge.direction,
    way: charge.way,
    finish: charge.finish,
    targetVolts: charge.frozen.target.volts,
    toleranceVolts: charge.toleranceVolts,
    groups: groupsOf(file),
    laggingGroup: live ? (reckoning?.laggingGroup ?? null) : null,
    lagVolts: live ? (reckoning?.lagVolts ?? 0) : 0,
    amps: isRunning(charge.stage) ? (swapWait(file) === null ? (reckoning?.amps ?? null) : 0) : null,
    clipOnAt: toInstant(charge.clipOnAt),
    startedAt: toOptionalInstant(charge.startedAt),
    segments: timedSegments(file, now),
    ready: readyBand(file, now),
    plannedReady: band(charge.plannedEarlyAt, charge.plannedLikelyAt, charge.plannedLateAt)!,
    readyBy: toOptionalInstant(charge.readyBy),
    taperAt: toOptionalInstant(charge.taperAt),
    currentEndAt: toOptionalInstant(charge.currentEndAt),
    checkDueAt: toOptionalInstant(charge.checkDueAt),
    readyAt: toOptionalInstant(charge.readyAt),
    overdueSince: toOptionalInstant(late),
    heldAt: toOptionalInstant(charge.heldAt),
    stoppedAt: toOptionalInstant(charge.stoppedAt),
    lookIns: file.lookIns.map((one) => ({
      id: one.id,
      dueAt: toInstant(one.dueAt),
      doneAt: toOptionalInstant(one.doneAt),
      by: personRef(people, one.personId),
    })),
    nextLookInAt: toOptionalInstant(nextLookIn(file, now)?.dueAt ?? null),
    lastReadingAt: toOptionalInstant(validReadings(file.readings).at(-1)?.at ?? null),
    nextHand: nextHand(file),
    rev: charge.rev,
  };
}

/** A charge with all that its own page shows. */
export async function chargeDto(
  manager: EntityManager,
  config: Config,
  file: ChargeFile,
  member: Member,
  now: number,
): Promise<ChargeDto> {
  const { charge } = file;
  const fresh = freshened(file, now);
  const reckoning = fresh.charge.reckoning?.reckoning ?? null;
  const answers = (await answersOf(manager, charge.workshopId, [charge.id])).get(charge.id) ?? [];
  const events = (await eventsOf(manager, charge.workshopId, [charge.id])).get(charge.id) ?? [];
  const sheet = await checkSheet(manager, file, answers, now);
  const topUpOf = charge.topUpOf === null ? null : await chargeNames(manager, charge.workshopId, [charge.topUpOf]);
  return {
    ...chargeCard(fresh, now),
    option: charge.option,
    channels: channelsOf(file).map((channel) => ({
      id: channel.id,
      name: channel.name,
      fault: faultDto(channel, file.people),
    })),
    moduleTypeId: charge.moduleTypeId,
    shelfPlace: file.spare.shelfPlace,
    meterId: charge.targetMeterId,
    targetCelsius: charge.targetCelsius,
    targetSoc: typeof charge.frozen.target.soc === 'number' ? charge.frozen.target.soc * 100 : null,
    targetTypedVolts: charge.targetVolts,
    topUpOf: link(topUpOf?.get(charge.topUpOf ?? '') ?? null),
    wentOnAs: link(await findTopUpOf(manager, charge.workshopId, charge.id)),
    stopReason: charge.stopReason,
    minRestS: charge.minRestS,
    deliveredAh: Math.abs(reckoning?.deliveredAh ?? 0),
    plannedAh: Math.abs(reckoning?.plannedAh ?? charge.option.ampHours),
    stepIndex: reckoning?.stepIndex ?? 0,
    expected: expectedOf(fresh),
    checks: sheet.items,
    startBlockedBy: isWaitingToStart(charge.stage) ? await startBlock(manager, file, sheet) : null,
    planAgain: sheet.moved !== null,
    readings: byTime(file.readings).map((reading) => readingDto(file, reading, member)),
    restChecks: file.restChecks.map((check) => restCheckDto(file, check)),
    events: events.map((event) => eventDto(file, event)),
    rest: restDto(fresh),
    odd: oddDto(fresh),
    learned: reckoning?.learned ?? { capacityAh: null, longOhm: null, leadOhm: null },
    dominant: reckoning?.dominant ?? charge.option.dominant,
    createdAt: toInstant(charge.createdAt),
    labelUrl: `${(config.publicUrl ?? '').replace(/\/+$/, '')}/charges/${charge.id}`,
  };
}

const byTime = (readings: readonly ChargeReading[]): ChargeReading[] =>
  [...readings].sort((one, other) => one.at - other.at || one.createdAt - other.createdAt);

const link = (charge: ChargeName | null): ChargeDto['topUpOf'] =>
  charge === null ? null : { id: charge.id, number: charge.number };

/** The charge as reckoned for this moment; only looked at, not written. Stage and instants stay the server's. */
function freshened(file: ChargeFile, now: number): ChargeFile {
  const { charge } = file;
  const at = chargeNow(charge, now);
  const flows = isRunning(charge.stage) || charge.stage === 'resting';
  if (!flows || charge.reckoning === null || at - charge.reckoning.at < FRESH_MS) return file;
  const fresh = { ...file, charge: { ...charge } };
  reckonTo(fresh, now);
  return fresh;
}

/** The forecast while it rests; over and checked, it is history. */
function restDto({ charge }: ChargeFile): RestDto | null {
  const rest = charge.reckoning?.rest ?? null;
  if (rest === null || (charge.stage !== 'resting' && charge.stage !== 'check-due')) return null;
  const { enoughAtS, ...said } = rest;
  return { ...said, enoughAt: enoughAtS === null ? null : toInstant(instantOf(charge, enoughAtS)) };
}

/** Only of a charge that goes on: of one that is over there is nothing to check any more. */
function oddDto({ charge }: ChargeFile): OddDto | null {
  const odd = charge.reckoning?.reckoning.odd ?? null;
  if (odd === null || !isUnderWay(charge.stage)) return null;
  const { sinceS, ...seen } = odd;
  return { ...seen, since: toInstant(readingInstantOf(charge, sinceS)) };
}

function expectedOf({ charge }: ChargeFile): ChargeDto['expected'] {
  const expected = charge.reckoning?.reckoning.expected ?? null;
  return expected === null
    ? null
    : {
        at: toInstant(instantOf(charge, expected.s)),
        terminalVolts: expected.terminalVolts,
        amps: expected.amps,
        celsius: expected.celsius,
      };
}

/** A reading as its charge shows it. */
export const readingDto = (file: ChargeFile, reading: ChargeReading, member: Member): ReadingDto => ({
  id: reading.id,
  at: toInstant(reading.at),
  terminalVolts: reading.terminalVolts,
  amps: reading.amps,
  celsius: reading.celsius,
  groupVolts: reading.groupVolts,
  meterId: reading.meterId,
  takenAt: reading.takenAt,
  by: personRef(file.people, reading.personId)!,
  source: reading.source,
  replacedBy: reading.replacedById,
  replaces: reading.replacesId,
  reason: reading.reason,
  mayCorrect: mayCorrect(file, reading, member),
});

/** Its writer, or who may correct anybody's, as long as the charge goes on. */
export const mayCorrect = (file: ChargeFile, reading: ChargeReading, member: Member): boolean =>
  reading.replacedById === null &&
  isOpen(file.charge.stage) &&
  (reading.personId === member.personId || can(member.role, 'charge:correct-any'));

const restCheckDto = (file: ChargeFile, check: RestCheck): RestCheckDto => ({
  id: check.id,
  at: toInstant(check.at),
  by: personRef(file.people, check.personId)!,
  groupVolts: check.groupVolts,
  celsius: check.celsius,
  early: check.early === true,
  verdict: check.verdict,
});

const eventDto = (file: ChargeFile, event: ChargeEvent): ChargeEventDto => ({
  id: event.id,
  at: toInstant(event.at),
  kind: event.kind,
  by: personRef(file.people, event.personId),
  text: event.text,
});
