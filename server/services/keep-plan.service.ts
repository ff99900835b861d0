import type { EntityManager } from 'typeorm';
import type { PlanOption } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import type { KeepPlanRequest, PlanDto } from '@/shared/contract/plan';
import type { Deps, Member } from '../deps';
import type { Charge } from '../entities/charge';
import { conflict, DomainError, invalid, notFound } from '../errors/domain-error';
import { insertHolds } from '../repositories/charge-rows.repository';
import {
  deleteCharge,
  findCharge,
  findOpenChargeOfSpare,
  insertCharge,
  nextChargeNumber,
} from '../repositories/charges.repository';
import { chargeCard, chargeDto } from './charge-dto';
import { loadFile, type ChargeFile } from './charge-file';
import { reservedHolds } from './charge-holds';
import { isUnderWay, isWaitingToStart } from './charge-stages';
import { clockText, durationText, titleOf } from './charge-words';
import { announce, settle, type Announcement } from './charge-write';
import { latestStartAt } from './charge-causes';
import { newId } from './ids';
import { planFor, type PlanInputs } from './plan-inputs';
import { giveToRepair, repairOfPlan } from './repair-charges';
import { refuseReserved } from './repair-spares.service';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';
import { lastChange, toldBy } from './who-changed';

/**
 * Keeps one option of a plan as a charge. The plan is made again from what is known now; where the option is not among
 * its ways any more, nothing is kept and the new plan comes back.
 *
 * With `topUpOf` the charge that is topped up is closed first: its spare goes on in the new one. With `insteadOf` the
 * charge that was planned from older numbers is dropped, in the same transaction: the spare is never without a plan.
 * @throws DomainError 409 the option is gone, the spare has an open charge; 422 the numbers rule it out
 */
export async function keepPlan(deps: Deps, member: Member, request: KeepPlanRequest, now: number): Promise<ChargeDto> {
  const kept = inTransaction(deps, async (manager) => {
    const done: Announcement[] = [];
    const toppedUp = request.topUpOf ? await toppedUpFile(manager, member, request, request.topUpOf) : null;
    const replaced = request.insteadOf ? await replacedFile(manager, member, request, request.insteadOf, now) : null;
    await refuseTakenSpare(manager, member, request.spareId, toppedUp ?? replaced, now);
    const repair = await repairOfPlan(manager, member.workshopId, request, (toppedUp ?? replaced)?.charge ?? null);
    const planned = await planFor(manager, member.workshopId, request, now);
    await refuseReserved(manager, member.workshopId, planned.spare, repair?.repair.id ?? null);
    const option = optionOf(planned.dto, request.optionId);
    const number = `C-${String(await nextChargeNumber(manager, member.workshopId)).padStart(4, '0')}`;
    const charge = chargeRow(member, request, planned, option, number, now);
    if (repair !== null) await giveToRepair(manager, member, charge, repair, Boolean(request.repairId), now);
    if (toppedUp !== null) done.push(await closeForTopUp(manager, member, toppedUp, number, now));
    // What was to be topped up is still what this one goes on from.
    charge.topUpOf ??= replaced?.charge.topUpOf ?? null;
    if (replaced !== null) await deleteCharge(manager, member.workshopId, replaced.charge.id);
    await insertCharge(manager, charge);
    await insertHolds(manager, reservedHolds(charge));
    const file = await loadFile(manager, member.workshopId, charge.id);
    const from = toppedUp ? ` It tops up ${toppedUp.charge.number}.` : '';
    const instead = replaced ? ` In place of ${replaced.charge.number}.` : '';
    const text = `${keptText(file, now)}${from}${instead}`;
    const kept = await settle(manager, file, now, [{ at: now, kind: 'planned', personId: member.personId, text }]);
    done.push({ ...kept, stock: true, channels: true });
    if (replaced !== null) done.push({ ...kept, charge: replaced.charge, alerts: { raised: [], changed: [] } });
    return { dto: await chargeDto(manager, deps.config, file, member, now), announcements: done };
  });
  const { dto, announcements } = await refusingTaken(kept);
  for (const announcement of announcements) announce(deps, announcement, now);
  return dto;
}

async function toppedUpFile(
  manager: EntityManager,
  member: Member,
  request: KeepPlanRequest,
  id: string,
): Promise<ChargeFile> {
  const file = await loadFile(manager, member.workshopId, id);
  if (file.charge.spareId !== request.spareId)
    throw invalid({ spareId: `${file.charge.number} is of another spare. A top-up goes on with the same one.` });
  if (file.charge.stage !== 'check-due' && file.charge.stage !== 'resting')
    throw conflict('not_checked', `${titleOf(file.charge)} has no check that needs a top-up.`);
  if (file.charge.checkedAt === null)
    throw conflict(
      'not_checked',
      `Enter the group voltages of ${titleOf(file.charge)} first: the top-up is planned from them.`,
    );
  return file;
}

/** The charge to be planned anew; null where somebody has dropped it already. */
async function replacedFile(
  manager: EntityManager,
  member: Member,
  request: KeepPlanRequest,
  id: string,
  now: number,
): Promise<ChargeFile | null> {
  if ((await findCharge(manager, member.workshopId, id)) === null) return null;
  const file = await loadFile(manager, member.workshopId, id);
  if (file.charge.spareId !== request.spareId)
    throw invalid({ spareId: `${file.charge.number} is of another spare. It is planned again with the same one.` });
  if (isWaitingToStart(file.charge.stage)) return file;
  const begun = `${titleOf(file.charge)} is begun meanwhile. Go on with it, or stop it first.`;
  const last = await lastChange(manager, file, member, now, ['started']);
  throw toldBy(conflict('wrong_stage', begun, chargeCard(file, now)), last);
}

async function refuseTakenSpare(
  manager: EntityManager,
  member: Member,
  spareId: string,
  goesOn: ChargeFile | null,
  now: number,
): Promise<void> {
  const open = await findOpenChargeOfSpare(manager, member.workshopId, spareId);
  if (open === null || open.id === goesOn?.charge.id) return;
  const taken = conflict(
    'spare_taken',
    `This spare is on ${titleOf(open)} already. Take another spare, or go on with that charge.`,
    {
      chargeId: open.id,
      title: titleOf(open),
      stage: open.stage,
    },
  );
  const file = await loadFile(manager, member.workshopId, open.id);
  throw toldBy(taken, await lastChange(manager, file, member, now, ['planned']));
}

/** @throws DomainError with the plan as it is now, where the option is not one of its ways */
function optionOf({ plan, ...rest }: PlanDto, optionId: string): PlanOption {
  const [refusal] = plan.refusals;
  if (refusal) throw new DomainError(422, 'ruled_out', refusal.text, { present: { plan, ...rest } });
  const option = plan.options.find((one) => one.id === optionId);
  if (option) return option;
  const gone = plan.alreadyWithin
    ? 'This spare is within the tolerance already: there is nothing to charge.'
    : 'This way cannot be done any more: the bench has changed meanwhile. Here is the plan as it is now.';
  throw conflict('option_gone', gone, { plan, ...rest });
}

function chargeRow(
  member: Member,
  request: KeepPlanRequest,
  planned: PlanInputs,
  option: PlanOption,
  number: string,
  now: number,
): Charge {
  const { frozen, spare, type, clipOnAt, readyBy } = planned;
  const at = (seconds: number): number => clipOnAt + Math.round(seconds * 1000);
  const row: Charge = {
    id: newId(),
    workshopId: member.workshopId,
    number,
    repairRef: request.repairRef,
    repairId: null,
    modulePosition: request.modulePosition,
    spareId: spare.id,
    neighbourSpareId: option.way === 'resistor' ? planned.neighbourSpareId : null,
    moduleTypeId: type.id,
    personId: member.personId,
    createdById: member.personId,
    stage: 'planned',
    heldFrom: null,
    direction: option.direction,
    way: option.way,
    finish: option.finish,
    targetVolts: planned.typedVolts,
    toleranceVolts: frozen.target.toleranceVolts,
    targetMeterId: request.meterId,
    targetCelsius: request.packCelsius,
    minRestS: Math.round(option.restS),
    option,
    frozen,
    reckoning: null,
    readyBy,
    clipOnAt,
    plannedEarlyAt: at(option.totalS.p10),
    plannedLikelyAt: at(option.totalS.p50),
    plannedLateAt: at(option.totalS.p90),
    earlyAt: null,
    likelyAt: null,
    lateAt: null,
    queuedAt: null,
    startedAt: null,
    taperAt: null,
    currentEndAt: null,
    currentOffSaid: false,
    checkDueAt: null,
    checkedAt: null,
    readyAt: null,
    closedAt: null,
    heldAt: null,
    stoppedAt: null,
    stopReason: null,
    topUpOf: request.topUpOf ?? null,
    nextDueAt: null,
    rev: 1,
    createdAt: now,
  };
  return { ...row, nextDueAt: latestStartAt({ charge: row }) };
}

async function closeForTopUp(
  manager: EntityManager,
  member: Member,
  file: ChargeFile,
  number: string,
  now: number,
): Promise<Announcement> {
  const { charge } = file;
  if (!isUnderWay(charge.stage)) throw notFound('The charge to top up');
  charge.stage = 'shelved';
  charge.closedAt = now;
  charge.rev += 1;
  return settle(manager, file, now, [
    { at: now, kind: 'went-on', personId: member.personId, text: `Went on as ${number}.` },
  ]);
}

const wayWords = {
  terminals: 'Terminals',
  'group-by-group': 'Group by group',
  paralleled: 'Groups paralleled',
  resistor: 'Through a resistor',
} as const;
const finishWords = { 'on-the-mark': 'on the mark', 'over-and-settle': 'over and settle' } as const;

function keptText({ charge, workshop }: ChargeFile, now: number): string {
  const { option } = charge;
  const clock = (at: number): string => clockText(at, workshop.zone, now);
  const band = `${clock(charge.plannedEarlyAt)}–${clock(charge.plannedLateAt)}`;
  return `Planned: ${wayWords[charge.way]}, ${finishWords[charge.finish]}, ${option.channelText}. ${durationText(option.totalS.p50)}, ready ${clock(charge.plannedLikelyAt)} (${band}).`;
}
