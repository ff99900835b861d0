/** What a proposal says. */
import type { PlacedDto, ProposalDto } from '@/shared/contract/bench-plan';
import type { InstantBand } from '@/shared/contract/charge';
import type { ChargeFile } from '../charge-file';
import { isRunning } from '../charge-stages';
import { clockText, durationText, listText, titleOf, upperFirst } from '../charge-words';
import { toInstant, toOptionalInstant } from '../instants';
import { lateMs, mayBegin, type Movable, type Placed, type BenchModel } from './bench-model';
import type { BenchGround } from './ground';
import { heldSpans } from './held-spans';
import { idOf, isSamePlace } from './present-plan';
import { pushed, type Proposal, type ProposedMove } from './proposals';

const minutes = (ms: number): number => Math.round(ms / 60_000);
/** A charge is told as late from this on: bands are minutes wide, ms. */
const TOLD_LATE_MS = 5 * 60_000;

export const bandOf = ({ at, totalS }: Placed): InstantBand => ({
  early: toInstant(at + Math.round(totalS.p10 * 1000)),
  likely: toInstant(at + Math.round(totalS.p50 * 1000)),
  late: toInstant(at + Math.round(totalS.p90 * 1000)),
});

export const channelNamesOf = ({ channels }: Pick<ChargeFile, 'channels'>, ids: readonly string[]): string[] =>
  ids.map((id) => channels.get(id)?.name ?? 'a channel that is gone');

export const placedDto = (movable: Movable, placed: Placed): PlacedDto => ({
  channelNames: channelNamesOf(movable.file, placed.channelIds),
  clipOnAt: toInstant(placed.at),
  ready: bandOf(placed),
  lateByMinutes: minutes(lateMs(movable.dueAt, placed)),
});

/** '30 min later', '1 h 20 sooner', 'at the same time'. */
export function laterText(fromMs: number, toMs: number): string {
  const ms = toMs - fromMs;
  if (Math.abs(minutes(ms)) < 1) return 'at the same time';
  return `${durationText(Math.abs(ms) / 1000)} ${ms > 0 ? 'later' : 'sooner'}`;
}

const readyMs = ({ at, totalS }: Placed): number => at + totalS.p50 * 1000;

/** 'R-2421 ready 30 min later, on time' */
function moveText({ movable, now, then }: ProposedMove): string {
  const late = minutes(lateMs(movable.dueAt, then));
  const onTime = movable.dueAt === null ? '' : late === 0 ? ', on time' : `, ${durationText(late * 60)} late`;
  return `${titleOf(movable.file.charge)} ready ${laterText(readyMs(now), readyMs(then))}${onTime}`;
}

export function proposalDto(proposal: Proposal): ProposalDto {
  const { model, moves, worth } = proposal;
  const weighted = (ms: number): number => Math.round(ms / 60_000);
  return {
    id: proposal.id,
    at: toInstant(model.ground.now),
    because: becauseOf(proposal),
    moves: moves.map((move) => ({
      chargeId: idOf(move.movable),
      rev: move.movable.file.charge.rev,
      title: titleOf(move.movable.file.charge),
      dueAt: toOptionalInstant(move.movable.dueAt),
      now: placedDto(move.movable, move.now),
      then: placedDto(move.movable, move.then),
      text: moveText(move),
    })),
    asTheyAre: proposal.stay.map(({ file }) => `${titleOf(file.charge)} as it is`),
    unplaced: proposal.unplaced.map((movable) => ({
      chargeId: idOf(movable),
      title: titleOf(movable.file.charge),
      because: unplacedText(model, movable),
    })),
    lateMinutes: { now: weighted(worth.now.lateMs), then: weighted(worth.then.lateMs) },
    proved: proposal.proved,
  };
}

/** Why no channel can carry a charge out in the week to come. */
export function unplacedText(model: BenchModel, movable: Movable): string {
  const { alternatives, because, file } = movable;
  if (alternatives.length === 0) return Object.values(because)[0] ?? 'No channel can bring it there this way.';
  const shortest = Math.min(...alternatives.map(({ busyS }) => busyS));
  if (mayBegin(model, file, shortest * 1000).length > 0) return 'Every channel it could have is taken for a week.';
  if (model.ground.people.every(({ present }) => present.length === 0))
    return 'Nobody has working hours in the week to come. Give people their hours.';
  return `Its current takes ${durationText(shortest)}, longer than anybody is there at a stretch. Let charges run unattended in the workshop’s settings, or plan it on a stronger channel.`;
}

/** The reason that tells most: what has happened first, then what is wrong with today's plan, then what is gained. */
function becauseOf(proposal: Proposal): string {
  const { model, moves, present } = proposal;
  const { ground } = model;
  const channelIds = new Set(moves.flatMap(({ movable }) => movable.present.channelIds));
  const inTheWay = lateOn(ground, channelIds) ?? heldOn(ground, channelIds);
  if (inTheWay !== null) return inTheWay;
  const [aside] = pushed(model, present);
  if (aside) return asideText(model, aside, proposal);
  const late = [...moves].sort((a, b) => lateMs(b.movable.dueAt, b.now) - lateMs(a.movable.dueAt, a.now))[0]!;
  const lateBy = lateMs(late.movable.dueAt, late.now);
  if (lateBy >= 60_000)
    return `${titleOf(late.movable.file.charge)} misses its time by ${durationText(lateBy / 1000)} as planned.`;
  const sooner = proposal.worth.now.endsAt - proposal.worth.then.endsAt;
  return `All are ready ${durationText(sooner / 1000)} sooner.`;
}

/** The running charge on one of these channels that is furthest behind its plan: 'R-2406 is 22 min late on B2.' */
function lateOn(ground: BenchGround, channelIds: ReadonlySet<string>): string | null {
  const behind = ground.files
    .filter(({ charge }) => isRunning(charge.stage) && charge.currentEndAt !== null)
    .flatMap((file) => {
      const { charge } = file;
      const here = heldSpans(file, ground.now).find((one) => channelIds.has(one.channelId) && one.to >= ground.now);
      const ms = Math.max(charge.currentEndAt!, ground.now) - plannedCurrentEnd(file);
      return here === undefined || ms < TOLD_LATE_MS ? [] : [{ file, ms, channelId: here.channelId }];
    })
    .sort((a, b) => b.ms - a.ms)[0];
  if (behind === undefined) return null;
  const [name] = channelNamesOf(behind.file, [behind.channelId]);
  return `${titleOf(behind.file.charge)} is ${durationText(behind.ms / 1000)} late on ${name}.`;
}

/** End of current by the plan that was given its word for, epoch ms. */
const plannedCurrentEnd = ({ charge }: ChargeFile): number =>
  charge.plannedLikelyAt - (charge.option.totalS.p50 - charge.option.currentEndS) * 1000;

function heldOn(ground: BenchGround, channelIds: ReadonlySet<string>): string | null {
  for (const file of ground.files.filter(({ charge }) => charge.stage === 'held')) {
    const here = heldSpans(file, ground.now).find((one) => channelIds.has(one.channelId) && one.to >= ground.now);
    if (here) return `${titleOf(file.charge)} is held on ${channelNamesOf(file, [here.channelId])[0]}.`;
  }
  return null;
}

/** Why a charge does not come to its turn when the plan says. */
function asideText(model: BenchModel, aside: Movable, { present, moves }: Proposal): string {
  const { file } = aside;
  const wished = Math.max(model.origin, aside.present.at);
  const clock = clockText(wished, file.workshop.zone, model.ground.now);
  const may = mayBegin(model, file, aside.present.busyMs).some(({ from, to }) => wished >= from && wished <= to);
  if (!may) return `Nobody is there for ${titleOf(file.charge)} from ${clock} until its current ends.`;
  const other = model.movables.find(
    (one) =>
      one !== aside &&
      one.present.channelIds.some((id) => aside.present.channelIds.includes(id)) &&
      present.get(idOf(one))!.at < present.get(idOf(aside))!.at,
  );
  const names = listText(channelNamesOf(file, aside.present.channelIds));
  if (other && !moves.some(({ movable, then }) => movable === other && isSamePlace(movable.present, then)))
    return `${upperFirst(titleOf(other.file.charge))} and ${titleOf(file.charge)} want ${names} at the same time.`;
  return `${names} is not free for ${titleOf(file.charge)} at ${clock}.`;
}
