/** What is done with a charge before its current: the checks, a time on the bench, or dropping it. */
import type { PlanOption } from '@/calc/plan-types';
import type { AnswerCheckInput, ChargeDto, CheckItemDto } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import { conflict, DomainError, invalid } from '../errors/domain-error';
import { answersOf, replaceAnswer, updateHold } from '../repositories/charge-rows.repository';
import { deleteCharge, raiseBoardRev, updateCharge } from '../repositories/charges.repository';
import { checkSheet } from './charge-checks';
import { titleOfCheck } from './charge-check-items';
import { chargeCard, chargeDto } from './charge-dto';
import { loadFile } from './charge-file';
import { actInstant } from './charge-instants';
import { isWaitingToStart } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { bare, clockText, lowerFirst, titleOf } from './charge-words';
import { changeCharge, type ChargeWrite } from './charge-write';
import { newId } from './ids';
import { fromInstant, toInstant } from './instants';
import { followDrop } from './repair-charges';
import { announceRepair } from './repair-write';
import { inTransaction } from './unit-of-work';
import { lastChange, staleCharge, toldBy } from './who-changed';

/**
 * Answers one check before clipping on; an earlier answer stays with the charge. An answer that had to wait for a
 * connection counts from when it was given, for the question that was read then, and not over a later one.
 * @throws DomainError 409 after the start or where a late answer is overtaken, 422 where the numbers answer
 */
export function answerCheck(
  deps: Deps,
  member: Member,
  id: string,
  input: AnswerCheckInput,
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, null, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (!isWaitingToStart(charge.stage)) throw wrongStage(write, 'Its checks are closed.');
    const answers = (await answersOf(manager, charge.workshopId, [charge.id])).get(charge.id) ?? [];
    const item = (await checkSheet(manager, file, answers, now)).items.find((one) => one.code === input.code)!;
    if (item.by !== 'person')
      throw new DomainError(422, 'locked', `${item.title} is answered by the numbers and locked. ${item.detail}`, {
        present: item,
      });
    const note = input.note ?? null;
    const at = actInstant(file, input.at, now, { at: charge.createdAt, name: 'the plan' });
    refuseOvertaken(write, input, item, at);
    await replaceAnswer(manager, {
      id: newId(),
      workshopId: charge.workshopId,
      chargeId: charge.id,
      code: input.code,
      answer: input.answer,
      note,
      personId: member.personId,
      at,
      replacedAt: null,
    });
    const before =
      item.answer === null || item.answer === input.answer ? '' : ` Before: ${lowerFirst(item[item.answer])}.`;
    const said = `${titleOfCheck(input.code)}: ${lowerFirst(item[input.answer])}${note === null ? '' : `, ${bare(note)}`}.`;
    write.note('check', `${said}${before}`, at);
  });
}

/** Somebody has answered after a late answer was given, or the question has changed since: a person looks again. */
function refuseOvertaken({ file, now }: ChargeWrite, input: AnswerCheckInput, item: CheckItemDto, at: number): void {
  if (input.at === undefined) return;
  const { zone } = file.workshop;
  if (item.answeredAt !== null && item.answer !== null && fromInstant(item.answeredAt) > at) {
    const who = item.answeredBy?.name ?? 'Somebody';
    const later = clockText(fromInstant(item.answeredAt), zone, now);
    throw conflict(
      'answered_later',
      `${who} answered it at ${later}, after yours of ${clockText(at, zone, now)}: ${lowerFirst(item[item.answer])}. Look again, then answer.`,
      item,
    );
  }
  if (input.asked !== undefined && input.asked !== item.question)
    throw conflict(
      'asked_otherwise',
      `The question has changed since ${clockText(at, zone, now)}. Now it is: ${item.question}`,
      item,
    );
}

/**
 * Puts the charge into the queue for a clip-on time. A later time shortens its wait for the channel.
 * @throws DomainError 409 where it is begun, 400 for a time that has passed
 */
export function queueCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { clipOnAt: string | null },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge, workshop } = file;
    if (!isWaitingToStart(charge.stage)) throw wrongStage(write, 'Only a charge that is not begun can be queued.');
    const wished = input.clipOnAt === null ? Math.max(now, charge.clipOnAt) : fromInstant(input.clipOnAt);
    if (wished < now - 60_000) throw invalid({ clipOnAt: 'This time has passed. Type a later one.' });
    const option = waitingFrom(charge.option, (wished - charge.clipOnAt) / 1000);
    charge.stage = 'queued';
    charge.queuedAt = now;
    charge.clipOnAt = wished;
    const at = (seconds: number): number => wished + Math.round(seconds * 1000);
    charge.plannedEarlyAt = at(option.totalS.p10);
    charge.plannedLikelyAt = at(option.totalS.p50);
    charge.plannedLateAt = at(option.totalS.p90);
    if (option !== charge.option) {
      charge.option = option;
      await updateCharge(manager, charge.workshopId, charge.id, { option });
    }
    for (const hold of file.holds) {
      const step = option.steps[hold.stepIndex];
      if (!step) continue;
      const patch = { fromAt: at(step.startS), toAt: at(step.stopS) };
      await updateHold(manager, charge.workshopId, hold.id, patch);
      Object.assign(hold, patch);
    }
    const ready = clockText(charge.plannedLikelyAt, workshop.zone, now);
    write.note('queued', `Queued, clip on at ${clockText(wished, workshop.zone, now)}: ready ${ready}.`);
  });
}

/** The same option with its wait for the channel shortened by a clip-on that is `laterS` later; unchanged where it has none. */
function waitingFrom(option: PlanOption, laterS: number): PlanOption {
  const cut = option.queueS - Math.max(0, option.queueS - laterS);
  if (option.queueS === 0 || cut === 0) return option;
  const less = (seconds: number): number => Math.max(0, seconds - cut);
  return {
    ...option,
    queueS: less(option.queueS),
    currentStartS: less(option.currentStartS),
    currentEndS: less(option.currentEndS),
    totalS: { p10: less(option.totalS.p10), p50: less(option.totalS.p50), p90: less(option.totalS.p90) },
    segments: option.segments
      .map((segment) => ({ ...segment, fromS: less(segment.fromS), toS: less(segment.toS) }))
      .filter((segment) => segment.toS > segment.fromS),
    steps: option.steps.map((step) => ({
      ...step,
      startS: less(step.startS),
      stopS: less(step.stopS),
      voltageLimitAtS: step.voltageLimitAtS === null ? null : less(step.voltageLimitAtS),
    })),
    trace: option.trace.map((point) => ({ ...point, s: less(point.s) })),
  };
}

/**
 * Drops a charge that is not begun; its spare and channels are free again.
 * @throws DomainError 409 where it is begun, 412 where somebody else has changed it
 */
export async function dropCharge(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  const { workshopId } = member;
  const { boardRev, repair } = await inTransaction(deps, async (manager) => {
    const file = await loadFile(manager, workshopId, id);
    const { charge } = file;
    const last = await lastChange(manager, file, member, now);
    if (charge.rev !== rev) throw staleCharge(await chargeDto(manager, deps.config, file, member, now), last);
    if (!isWaitingToStart(charge.stage)) {
      const begun = `${titleOf(charge)} is begun. Stop it instead: what has happened is kept.`;
      throw toldBy(conflict('wrong_stage', begun, chargeCard(file, now)), last);
    }
    await deleteCharge(manager, workshopId, id);
    const followed = await followDrop(manager, member, file, now);
    return { boardRev: await raiseBoardRev(manager, workshopId), repair: followed };
  });
  const at = toInstant(now);
  deps.hub.toWorkshop(workshopId, 'board:changed', { rev: boardRev, at, chargeId: id });
  if (repair) announceRepair(deps, workshopId, repair, now);
  deps.hub.toWorkshop(workshopId, 'stock:changed', { at });
  deps.hub.toWorkshop(workshopId, 'equipment:changed', { at });
  deps.sleeper.poke();
}
