/** Moves charges that are not begun to other channels and times, all of them or none. */
import type { EntityManager } from 'typeorm';
import type { PlanOption } from '@/calc/plan-types';
import type { CheckCode, Stage } from '@/shared/contract/charge';
import type { Deps, Member } from '../../deps';
import type { BenchChange } from '../../entities/bench-change';
import type { MovedCharge } from '../../entities/bench-change-json';
import type { FrozenInputs } from '../../entities/charge-json';
import { conflict } from '../../errors/domain-error';
import { insertBenchChange } from '../../repositories/bench-changes.repository';
import { replaceHolds, retireAnswers } from '../../repositories/charge-rows.repository';
import { listBenchCharges, updateCharge } from '../../repositories/charges.repository';
import { chargeDto } from '../charge-dto';
import { loadFile, loadFiles, type ChargeFile } from '../charge-file';
import { reservedHolds } from '../charge-holds';
import { isWaitingToStart } from '../charge-stages';
import { clockText, listText, titleOf } from '../charge-words';
import { announce, settle, type Announcement } from '../charge-write';
import { newId } from '../ids';
import { toInstant } from '../instants';
import { refusingTaken } from '../unique-taken';
import { inTransaction } from '../unit-of-work';
import { lastChange, staleCharge, toldBy } from '../who-changed';
import { heldSpans } from './held-spans';
import { overlaps } from './spans';

/** What a charge is to be. */
export interface ChargeMove {
  chargeId: string;
  /** Of the charge as it was when the move was made up. */
  rev: number;
  stage: Stage;
  queuedAt: number | null;
  option: PlanOption;
  frozen: FrozenInputs;
  /** Epoch ms. */
  clipOnAt: number;
}

/** Two charges may share this much on paper, ms: bands are minutes wide. */
const SLACK_MS = 60_000;

/** What is asked at one channel says nothing at another. The spare's condition and warmth stay answered. */
const askedAtChannel: CheckCode[] = ['isolation', 'polarity', 'ceiling', 'ventilation', 'attendance'];

const placeOf = (file: ChargeFile, now: number): string =>
  `${listText(channelNames(file))} at ${clockText(file.charge.clipOnAt, file.workshop.zone, now)}`;
const channelNames = ({ charge, channels }: ChargeFile): string[] =>
  [...new Set(charge.option.channelIds)].map((id) => channels.get(id)?.name ?? 'a channel that is gone');

/**
 * Moves charges in one transaction, by the write path of every change of a charge: log, alerts, look-ins, repair and board
 * follow, and what they were before is kept so that it can be undone.
 * @param sayText what was done, from the sentences of the moves ('R-2418 from A1 at 14:45 to B1 at 14:00')
 * @throws DomainError 404 unknown, 412 with the present charge where somebody was quicker, 409 where one is begun or a
 * channel is taken, with which
 */
export async function moveCharges(
  deps: Deps,
  member: Member,
  moves: readonly ChargeMove[],
  sayText: (sentences: string[]) => string,
  now: number,
): Promise<BenchChange> {
  const moved = inTransaction(deps, (manager) => moveWithin(manager, deps, member, moves, sayText, now));
  const { change, announcements } = await refusingTaken(moved);
  for (const one of announcements) announce(deps, one, now);
  deps.hub.toWorkshop(member.workshopId, 'bench:changed', { at: toInstant(now) });
  return change;
}

/** The same within a transaction that does more. */
export async function moveWithin(
  manager: EntityManager,
  deps: Deps,
  member: Member,
  moves: readonly ChargeMove[],
  sayText: (sentences: string[]) => string,
  now: number,
): Promise<{ change: BenchChange; announcements: Announcement[] }> {
  const done: { file: ChargeFile; from: string; before: MovedCharge['before'] }[] = [];
  for (const move of moves) {
    const file = await movable(manager, deps, member, move, now);
    const from = placeOf(file, now);
    const before = beforeOf(file);
    await applyMove(manager, file, move, now);
    done.push({ file, from, before });
  }
  await refuseTaken(
    manager,
    member,
    done.map(({ file }) => file),
    now,
  );
  const announcements: Announcement[] = [];
  for (const { file, from } of done) {
    const ready = clockText(file.charge.plannedLikelyAt, file.workshop.zone, now);
    const note = {
      at: now,
      kind: 'moved',
      personId: member.personId,
      text: `Moved from ${from} to ${placeOf(file, now)}: ready ${ready}.`,
    };
    announcements.push({ ...(await settle(manager, file, now, [note])), channels: true });
  }
  const change: BenchChange = {
    id: newId(),
    workshopId: member.workshopId,
    personId: member.personId,
    text: sayText(done.map(({ file, from }) => `${titleOf(file.charge)} from ${from} to ${placeOf(file, now)}`)),
    moved: done.map(({ file, before }) => ({ chargeId: file.charge.id, revAfter: file.charge.rev, before })),
    at: now,
    undoneAt: null,
  };
  await insertBenchChange(manager, change);
  return { change, announcements };
}

async function movable(
  manager: EntityManager,
  deps: Deps,
  member: Member,
  move: ChargeMove,
  now: number,
): Promise<ChargeFile> {
  const file = await loadFile(manager, member.workshopId, move.chargeId);
  const { charge } = file;
  const last = () => lastChange(manager, file, member, now);
  if (charge.rev !== move.rev)
    throw staleCharge(await chargeDto(manager, deps.config, file, member, now), await last());
  if (isWaitingToStart(charge.stage)) return file;
  const begun = `${titleOf(charge)} is begun: it stays where it is.`;
  throw toldBy(conflict('wrong_stage', begun, { chargeId: charge.id, stage: charge.stage }), await last());
}

const beforeOf = ({ charge }: ChargeFile): MovedCharge['before'] => ({
  stage: charge.stage,
  option: charge.option,
  frozen: charge.frozen,
  clipOnAt: charge.clipOnAt,
  plannedEarlyAt: charge.plannedEarlyAt,
  plannedLikelyAt: charge.plannedLikelyAt,
  plannedLateAt: charge.plannedLateAt,
  minRestS: charge.minRestS,
  queuedAt: charge.queuedAt,
});

async function applyMove(manager: EntityManager, file: ChargeFile, move: ChargeMove, now: number): Promise<void> {
  const { charge } = file;
  const { option, frozen, clipOnAt } = move;
  const sameChannels =
    [...new Set(option.channelIds)].sort().join() === [...new Set(charge.option.channelIds)].sort().join();
  const at = (seconds: number): number => clipOnAt + Math.round(seconds * 1000);
  Object.assign(charge, {
    stage: move.stage,
    queuedAt: move.queuedAt,
    option,
    frozen,
    clipOnAt,
    plannedEarlyAt: at(option.totalS.p10),
    plannedLikelyAt: at(option.totalS.p50),
    plannedLateAt: at(option.totalS.p90),
    minRestS: Math.round(option.restS),
    rev: charge.rev + 1,
  });
  const { minRestS } = charge;
  await updateCharge(manager, charge.workshopId, charge.id, { option, frozen, minRestS });
  file.holds = reservedHolds(charge);
  await replaceHolds(manager, charge.workshopId, charge.id, file.holds);
  if (!sameChannels) await retireAnswers(manager, charge.workshopId, charge.id, askedAtChannel, now);
}

/** @throws DomainError 409 where a moved charge would share a channel with another, with which and until when */
async function refuseTaken(
  manager: EntityManager,
  member: Member,
  files: readonly ChargeFile[],
  now: number,
): Promise<void> {
  const moved = new Set(files.map(({ charge }) => charge.id));
  const rows = await listBenchCharges(manager, member.workshopId, now);
  const others = await loadFiles(
    manager,
    member.workshopId,
    rows.filter(({ id }) => !moved.has(id)),
  );
  for (const [place, file] of files.entries())
    for (const span of heldSpans(file, now)) {
      const wanted = { from: span.from + SLACK_MS, to: span.to - SLACK_MS };
      for (const other of [...others, ...files.slice(0, place)]) {
        const spans = heldSpans(other, now).filter(({ channelId }) => channelId === span.channelId);
        // What is held keeps its channel for nobody knows how long.
        const keeps = other.charge.stage === 'held';
        const inTheWay = spans.find((one) => (keeps && one.to >= now) || overlaps(one, wanted));
        if (inTheWay) throw taken(file, other, span.channelId, inTheWay.to, now);
      }
    }
}

function taken(file: ChargeFile, other: ChargeFile, channelId: string, until: number, now: number) {
  const channelName = file.channels.get(channelId)?.name ?? 'The channel';
  const { charge } = other;
  const held = charge.stage === 'held';
  const text = held
    ? `${channelName} is taken by ${titleOf(charge)}, which is held. Resume or stop it to free the channel.`
    : `${channelName} is taken by ${titleOf(charge)} until ${clockText(until, file.workshop.zone, now)}. Choose a later time, or another channel.`;
  return conflict('channel_taken', text, {
    chargeId: charge.id,
    title: titleOf(charge),
    stage: charge.stage,
    channelName,
  });
}
