import type { ChargeDto } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import type { RunStretch } from '../entities/run-stretch';
import { conflict, DomainError } from '../errors/domain-error';
import {
  answersOf,
  insertEvents,
  insertRun,
  releasedHoldsOn,
  replaceAnswer,
  updateHold,
} from '../repositories/charge-rows.repository';
import { findCharge, updateCharge } from '../repositories/charges.repository';
import { checkSheet, sheetBlock } from './charge-checks';
import { chargeCard } from './charge-dto';
import { actInstant } from './charge-instants';
import { stageFrom, isWaitingToStart } from './charge-stages';
import { channelNamesOf, stepsOfSwap } from './charge-steps';
import { wrongStage } from './charge-stage-conflict';
import { ampsText, setVoltsText, clockText, listText, titleOf } from './charge-words';
import { changeCharge, type ChargeWrite } from './charge-write';
import { newId } from './ids';
import { channelTaken, holdersOfStep, neighbourBlock } from './start-block';

/**
 * Clips on and starts the timer.
 * @throws DomainError 422 where a check is open, answered with no or ruled out by the numbers; 409 where a channel runs
 * another charge, with who has it, or the spare joined by a resistor is not what it was; 412 where somebody else was quicker
 */
export function startCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { at?: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (!isWaitingToStart(charge.stage)) throw wrongStage(write, 'Its timer runs already or is over.');
    await refuseByChecks(write);
    await refuseByChannels(write);
    await refuseByNeighbour(write);
    const at = actInstant(file, input.at, now, { at: charge.createdAt, name: 'the plan' });
    if (charge.stage === 'planned') rebasePlan(write, at);
    charge.stage = stageFrom({ stage: 'charging' }, charge.direction);
    charge.startedAt = at;
    charge.personId ??= member.personId;
    const run: RunStretch = {
      id: newId(),
      workshopId: charge.workshopId,
      chargeId: charge.id,
      fromAt: at,
      toAt: null,
      reason: null,
      personId: member.personId,
    };
    await insertRun(manager, run);
    file.runs = [run];
    await takeChannels(write, 0, at);
    write.note('started', startText(write), at);
  });
}

async function refuseByChecks({ manager, file, now }: ChargeWrite): Promise<void> {
  const { charge } = file;
  const answers = (await answersOf(manager, charge.workshopId, [charge.id])).get(charge.id) ?? [];
  const sheet = await checkSheet(manager, file, answers, now);
  const block = sheetBlock(sheet);
  if (block) throw new DomainError(422, block.code, block.text, { present: sheet.items });
  const temperature = sheet.items.find((item) => item.code === 'temperature')!;
  const { reading } = sheet;
  if (temperature.by !== 'data' || reading === null) return;
  // What the reading answered is kept with the charge; later readings must not change what was known at the start.
  await replaceAnswer(manager, {
    id: newId(),
    workshopId: charge.workshopId,
    chargeId: charge.id,
    code: 'temperature',
    answer: 'yes',
    note: temperature.question,
    // Who read it, and when.
    personId: reading.personId,
    at: reading.at,
    replacedAt: null,
  });
}

async function refuseByChannels(write: ChargeWrite): Promise<void> {
  const [holder] = await holdersOfStep(write.manager, write.file, 0);
  if (holder) throw await channelTaken(write, holder);
}

async function refuseByNeighbour({ manager, file, now }: ChargeWrite): Promise<void> {
  const block = await neighbourBlock(manager, file);
  if (block) throw conflict('neighbour_gone', block, chargeCard(file, now));
}

/** A plan without a date says how long; its band counts from the start. A queued one has given its word for a time. */
function rebasePlan({ file }: ChargeWrite, at: number): void {
  const { charge } = file;
  const { totalS, currentStartS } = charge.option;
  const ready = (seconds: number): number => at + Math.round((seconds - currentStartS) * 1000);
  charge.plannedEarlyAt = ready(totalS.p10);
  charge.plannedLikelyAt = ready(totalS.p50);
  charge.plannedLateAt = ready(totalS.p90);
}

/**
 * Puts the channels of a step to work. Who clips on has taken the clips off whatever rested there: a charge whose end of
 * current was only reckoned has it from now on.
 */
export async function takeChannels(
  { manager, file, member, now }: ChargeWrite,
  stepIndex: number,
  at: number,
): Promise<void> {
  const { charge, channels } = file;
  const steps = stepsOfSwap(charge.option, stepIndex);
  const holds = file.holds.filter((hold) => steps.includes(hold.stepIndex));
  // The step before lets go first: its channel may be the one that the next step takes.
  for (const hold of file.holds.filter((one) => one.state === 'running')) {
    const patch = { state: 'released' as const, toAt: file.runs.at(-2)?.toAt ?? at };
    await updateHold(manager, charge.workshopId, hold.id, patch);
    Object.assign(hold, patch);
  }
  for (const hold of holds) {
    const patch = { state: 'running' as const, fromAt: at, toAt: null };
    await updateHold(manager, charge.workshopId, hold.id, patch);
    Object.assign(hold, patch);
  }
  const ids = holds.map((hold) => hold.channelId);
  for (const other of await releasedHoldsOn(manager, charge.workshopId, ids)) {
    if (other.chargeId === charge.id) continue;
    const resting = await findCharge(manager, charge.workshopId, other.chargeId);
    if (!resting || resting.currentOffSaid || (resting.stage !== 'resting' && resting.stage !== 'check-due')) continue;
    const last = resting.option.steps.at(-1);
    if (!last?.channelIds.includes(other.channelId)) continue;
    const end = Math.min(resting.currentEndAt ?? at, at);
    // Due now: the sleeper brings it to what follows from that.
    await updateCharge(manager, charge.workshopId, resting.id, {
      currentOffSaid: true,
      currentEndAt: end,
      nextDueAt: now,
    });
    await insertEvents(manager, [
      {
        id: newId(),
        workshopId: charge.workshopId,
        chargeId: resting.id,
        at,
        kind: 'current-off',
        personId: member.personId,
        text: `${titleOf(charge)} was clipped on to ${channels.get(other.channelId)?.name ?? 'its channel'}, so its current is off.`,
        createdAt: now,
      },
    ]);
  }
}

function startText({ file, now }: ChargeWrite): string {
  const { charge, workshop } = file;
  const step = charge.option.steps[0];
  const names = listText(channelNamesOf(file, 0));
  const set = [
    step?.setVolts == null ? null : setVoltsText(step.setVolts, step.direction),
    step?.setAmps == null ? null : ampsText(step.setAmps),
  ].filter((part) => part !== null);
  const dial = set.length === 0 ? '' : `, set to ${set.join(' and ')}`;
  const ready = `ready ${clockText(charge.plannedLikelyAt, workshop.zone, now)} (${clockText(charge.plannedEarlyAt, workshop.zone, now)}–${clockText(charge.plannedLateAt, workshop.zone, now)})`;
  return `${names === '' ? 'Resistor on' : `Clipped on at ${names}`}${dial}: ${ready}.`;
}
