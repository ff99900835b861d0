import type { BenchChangeDto, MoveChargeInput, MovePlaceDto, MovePlacesDto } from '@/shared/contract/bench-plan';
import type { Deps, Member } from '../../deps';
import { conflict, invalid, notFound } from '../../errors/domain-error';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';
import { loadFile, type ChargeFile } from '../charge-file';
import { isWaitingToStart } from '../charge-stages';
import { clockText, titleOf } from '../charge-words';
import { fromInstant } from '../instants';
import { benchChangeDto } from './bench-changes';
import { benchModel, mayBegin, onChannels, placedBy, spansAhead, type BenchModel, type Movable } from './bench-model';
import type { Alternative } from './bench-tasks';
import { daysOf } from './days';
import { loadGround } from './ground';
import { moveCharges } from './move-charges';
import { idOf } from './present-plan';
import { placedDto, unplacedText } from './proposal-words';
import { earliestBegin } from './spans';
import { plannedAgain } from './way-input';

/** A clip-on that somebody chose a moment ago is meant for now, ms. */
const JUST_PASSED_MS = 60_000;

async function modelOf(deps: Deps, member: Member, now: number): Promise<BenchModel> {
  const { manager } = deps.dataSource;
  const { zone } = await workshopForPlans(manager, member.workshopId);
  const ground = await loadGround(manager, member.workshopId, daysOf(zone, undefined, 1, now), now);
  return benchModel(manager, deps.bench, ground);
}

/** @throws DomainError 404 unknown, 409 where it is begun or cannot be planned again, with the reason */
function movableIn(model: BenchModel, chargeId: string): Movable {
  const movable = model.movables.find((one) => idOf(one) === chargeId);
  if (movable) return movable;
  const file = model.ground.files.find(({ charge }) => charge.id === chargeId);
  if (!file) throw notFound('This charge');
  const { charge } = file;
  throw isWaitingToStart(charge.stage)
    ? conflict('cannot_move', `${titleOf(charge)} cannot be moved. ${model.stuck.get(charge.id) ?? ''}`)
    : conflict('wrong_stage', `${titleOf(charge)} is begun: it stays where it is.`, { stage: charge.stage });
}

/** Where a charge could go, each channel with the soonest time there. @throws DomainError 404, 409 as movableIn */
export async function movePlaces(deps: Deps, member: Member, chargeId: string, now: number): Promise<MovePlacesDto> {
  await loadFile(deps.dataSource.manager, member.workshopId, chargeId);
  const model = await modelOf(deps, member, now);
  const movable = movableIn(model, chargeId);
  return {
    chargeId,
    rev: movable.file.charge.rev,
    places: model.ground.channels.map((channel) => placeOn(model, movable, channel)),
  };
}

function placeOn(model: BenchModel, movable: Movable, channel: { id: string; name: string }): MovePlaceDto {
  const named = { channelId: channel.id, channelName: channel.name };
  const alternative = alternativeOn(movable, channel.id);
  if (alternative === null)
    return {
      ...named,
      soonest: null,
      because: movable.because[channel.id] ?? `${channel.name} cannot bring it there.`,
    };
  const at = soonestAt(model, movable, alternative);
  if (at === null)
    return { ...named, soonest: null, because: unplacedText(model, { ...movable, alternatives: [alternative] }) };
  return { ...named, soonest: placedDto(movable, placedBy(alternative, at)), because: null };
}

/** Of the ways that begin on a channel, the one that takes the fewest others. */
export function alternativeOn({ alternatives }: Movable, channelId: string): Alternative | null {
  const on = alternatives.filter(({ channelIds }) => channelIds.includes(channelId));
  return on.sort((a, b) => a.channelIds.length - b.channelIds.length)[0] ?? null;
}

/** The soonest clip-on with everything else staying where it is, epoch ms; null: there is none in the week to come. */
export function soonestAt(model: BenchModel, movable: Movable, { channelIds, busyS }: Alternative): number | null {
  const others = model.ground.files
    .filter(({ charge }) => charge.id !== idOf(movable))
    .flatMap((file) => spansAhead(file, model.ground.now, model.until));
  return earliestBegin(mayBegin(model, movable.file, busyS * 1000), onChannels(others, channelIds), busyS * 1000);
}

/**
 * Moves a charge that is not begun to a channel and a time; one that is only planned is queued with it.
 * @throws DomainError 404 unknown; 412 with the present charge; 409 begun, the channel taken (with by what), it cannot be
 * done there, or nobody is there then; 400 for a time that has passed
 */
export async function moveCharge(
  deps: Deps,
  member: Member,
  input: MoveChargeInput,
  now: number,
): Promise<BenchChangeDto> {
  const { manager } = deps.dataSource;
  const file = await loadFile(manager, member.workshopId, input.chargeId);
  const wished = fromInstant(input.clipOnAt);
  if (wished < now - JUST_PASSED_MS) throw invalid({ clipOnAt: 'This time has passed. Choose a later one.' });
  const clipOnAt = Math.max(now, wished);
  const channel = file.channels.get(input.channelId);
  if (!channel) throw notFound('This channel');
  const model = await modelOf(deps, member, now);
  const found = model.ground.files.find(({ charge }) => charge.id === input.chargeId);
  // Somebody else's change comes first: what is begun meanwhile is told as such, with the charge as it stands.
  if (file.charge.rev === input.rev || !found) movableIn(model, input.chargeId);
  const movable = model.movables.find((one) => idOf(one) === input.chargeId);
  const alternative = movable ? alternativeOn(movable, input.channelId) : null;
  if (movable && alternative === null)
    throw conflict('option_gone', movable.because[channel.id] ?? `${channel.name} cannot bring it there.`);
  if (alternative !== null) refuseNobodyThere(model, file, clipOnAt, alternative.busyS * 1000);
  const { ask, frozen } = await plannedAgain(manager, file, clipOnAt, now);
  const option = await deps.bench.option(ask, alternative?.channelIds ?? [channel.id]);
  if (option === null) throw conflict('option_gone', `${channel.name} cannot bring it there any more.`);
  const move = {
    chargeId: input.chargeId,
    rev: input.rev,
    stage: 'queued' as const,
    queuedAt: now,
    option,
    frozen,
    clipOnAt,
  };
  const change = await moveCharges(deps, member, [move], ([sentence]) => sentence ?? '', now);
  return benchChangeDto(manager, change);
}

/** Charges are not begun when nobody is there to look in, unless the workshop lets them. */
function refuseNobodyThere(model: BenchModel, file: ChargeFile, at: number, busyMs: number): void {
  const within = (stretches: { from: number; to: number }[]): boolean =>
    stretches.some(({ from, to }) => at >= from - JUST_PASSED_MS && at <= to);
  // The model begins with the next whole minute; a clip-on at once is meant as well.
  const from = { ...model, origin: model.ground.now };
  if (within(mayBegin(from, file, busyMs))) return;
  const clock = (instant: number): string => clockText(instant, file.workshop.zone, model.ground.now);
  if (!within(mayBegin(from, file, 0)))
    throw conflict('nobody_there', `Nobody is there to clip on at ${clock(at)}. Choose a time within working hours.`);
  throw conflict(
    'nobody_there',
    `Its current would run until ${clock(at + busyMs)}, and nobody is there to look in until then. Begin earlier, or let charges run unattended in the workshop’s settings.`,
  );
}
