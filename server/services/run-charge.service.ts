/** What is done to a charge whose current flows: hold, resume, the next step, the end of current, stop. */
import type { ChargeDto } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import { conflict } from '../errors/domain-error';
import { insertRun, updateRun } from '../repositories/charge-rows.repository';
import { updateSpare } from '../repositories/charge-stock.repository';
import { faultWords, isFaulty } from './channel-fault';
import { chargeCard } from './charge-dto';
import { actInstant } from './charge-instants';
import { reckonAt } from './charge-reckoning';
import { isRunning, isUnderWay, swapWait } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { SWAP_REASON, begunStep, channelNamesOf, handText, nextSwap, stepsOfSwap } from './charge-steps';
import { instantOf } from './charge-clock';
import { markVisit } from './charge-visit';
import { ampHoursText, bare, durationText, clockText, listText, titleOf } from './charge-words';
import { changeCharge, type ChargeWrite } from './charge-write';
import { newId } from './ids';
import { channelTaken, holdersOfStep } from './start-block';
import { takeChannels } from './start-charge.service';

/** Begin of the stretch that runs, with its name for a sentence. */
function lastBegin({ file }: ChargeWrite): { at: number; name: string } {
  const { charge, runs } = file;
  const run = runs.at(-1);
  if (!run || run.fromAt === charge.startedAt) return { at: charge.startedAt ?? 0, name: 'the start' };
  return { at: run.fromAt, name: 'the last time it was switched on' };
}

async function endRun({ manager, file, member }: ChargeWrite, at: number, reason: string): Promise<void> {
  const run = file.runs.at(-1);
  if (!run || run.toAt !== null) return;
  const patch = { toAt: at, reason, personId: member.personId };
  await updateRun(manager, file.charge.workshopId, run.id, patch);
  Object.assign(run, patch);
}

async function beginRun({ manager, file, member }: ChargeWrite, at: number): Promise<void> {
  const run = {
    id: newId(),
    workshopId: file.charge.workshopId,
    chargeId: file.charge.id,
    fromAt: at,
    toAt: null,
    reason: null,
    personId: member.personId,
  };
  await insertRun(manager, run);
  file.runs.push(run);
}

/** @throws DomainError 409 where a channel that a step needs is out of order */
function refuseFaulty({ file, now }: ChargeWrite, first: number): void {
  const { option } = file.charge;
  for (const id of stepsOfSwap(option, first).flatMap((index) => option.steps[index]!.channelIds)) {
    const channel = file.channels.get(id);
    if (isFaulty(channel))
      throw conflict(
        'ruled_out',
        `${faultWords(channel)} Stop this charge and plan what is left on another channel, or wait until ${channel.name} works again.`,
        chargeCard(file, now),
      );
  }
}

/** Interrupts a charge whose current flows. It keeps spare and channels. @throws DomainError 409 where nothing flows */
export function holdCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { reason: string; at?: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { charge } = write.file;
    if (!isRunning(charge.stage)) throw wrongStage(write, 'Nothing flows that could be held.');
    if (swapWait(write.file) !== null)
      throw wrongStage(write, 'It waits for the swap: nothing flows until the next step is begun.');
    const at = actInstant(write.file, input.at, now, lastBegin(write));
    await endRun(write, at, input.reason);
    charge.heldFrom = charge.stage;
    charge.heldAt = at;
    charge.stage = 'held';
    await markVisit(write, at, null);
    write.note('held', `Held: ${bare(input.reason)}.`, at);
  });
}

/** Goes on from the state reached. @throws DomainError 409 where it is not held */
export function resumeCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { at?: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { file } = write;
    const { charge, spare } = file;
    if (charge.stage !== 'held') throw wrongStage(write, 'Only a held charge can be resumed.');
    if (spare.quarantinedAt !== null || spare.condition !== 'sound')
      throw conflict('ruled_out', `${spare.label} is set aside. Stop this charge.`, chargeCard(file, now));
    refuseFaulty(write, begunStep(charge.option, file.runs));
    const at = actInstant(file, input.at, now, { at: charge.heldAt ?? 0, name: 'the hold' });
    const heldS = (at - (charge.heldAt ?? at)) / 1000;
    await beginRun(write, at);
    charge.stage = charge.heldFrom ?? 'charging';
    charge.heldFrom = null;
    charge.heldAt = null;
    await markVisit(write, at, null);
    write.note('resumed', `Resumed after ${durationText(Math.max(60, heldS))}.`, at);
  });
}

/** Says that the clips were moved: the step before has ended, the next one runs. @throws DomainError 409 */
export function nextStep(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { at?: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { file } = write;
    const { charge } = file;
    const next = nextSwap(charge.option, file.runs);
    if (!isRunning(charge.stage) || next === null) throw wrongStage(write, 'No further step waits.');
    const at = actInstant(file, input.at, now, lastBegin(write));
    refuseFaulty(write, next);
    const [holder] = await holdersOfStep(write.manager, file, next);
    if (holder) throw await channelTaken(write, holder);
    const wait = swapWait(file);
    await endRun(write, wait === null ? at : Math.min(wait.since, at), SWAP_REASON);
    const early = wait === null ? ' The step before was ended by hand, earlier than reckoned.' : '';
    await beginRun(write, at);
    await takeChannels(write, next, at);
    await markVisit(write, at, null);
    write.note('next-step', `Step ${next + 1} of ${charge.option.steps.length}: ${handText(file, next)}.${early}`, at);
  });
}

/**
 * Says when the last current was switched off; the rest counts from then, whatever was reckoned.
 * @throws DomainError 409 where a step follows, or nothing has flowed
 */
export function currentOff(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { at?: string },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { file } = write;
    const { charge, workshop } = file;
    if (!isRunning(charge.stage) && charge.stage !== 'resting' && charge.stage !== 'check-due')
      throw wrongStage(write, 'Its current is off already.');
    const next = nextSwap(charge.option, file.runs);
    if (next !== null)
      throw wrongStage(
        write,
        `A step follows: ${handText(file, next)}, then say that it is done. To interrupt, hold it.`,
      );
    const at = actInstant(file, input.at, now, lastBegin(write));
    const reckoned = charge.currentEndAt;
    charge.currentOffSaid = true;
    charge.currentEndAt = at;
    await endRun(write, at, 'switched off');
    await markVisit(write, at, null);
    const names = listText(channelNamesOf(file, charge.option.steps.length - 1));
    const clock = (instant: number): string => clockText(instant, workshop.zone, now);
    const against =
      reckoned === null || Math.abs(reckoned - at) < 60_000 ? '' : ` It was reckoned for ${clock(reckoned)}.`;
    write.note('current-off', `${names === '' ? 'Resistor' : names} off at ${clock(at)}.${against}`, at);
  });
}

/**
 * Stops a charge for good: channels and spare are free. The voltages reckoned so far are no reading; the spare is read
 * again before it is planned again.
 * @throws DomainError 409 where it is not under way
 */
export function stopCharge(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: { reason: string; at?: string; quarantine?: boolean },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, rev, now, async (write) => {
    const { manager, file } = write;
    const { charge, spare } = file;
    if (!isUnderWay(charge.stage)) throw wrongStage(write, 'There is nothing to stop.');
    const at = actInstant(file, input.at, now, lastBegin(write));
    const flows = isRunning(charge.stage) && swapWait(file) === null;
    await endRun(write, at, 'stopped');
    const reckoning = reckonAt(file, at);
    charge.reckoning = { at, reckoning };
    charge.currentEndAt = flows
      ? at
      : instantOf(charge, Math.min(reckoning.currentEndS, (at - charge.startedAt!) / 1000));
    charge.stage = 'stopped';
    charge.stoppedAt = at;
    charge.closedAt = now;
    charge.stopReason = input.reason;
    if (input.quarantine && spare.quarantinedAt === null)
      await updateSpare(manager, charge.workshopId, spare.id, {
        quarantinedAt: now,
        quarantineReason: input.reason,
        quarantinedById: member.personId,
      });
    write.note('stopped', stopText(write, input), at);
  });
}

function stopText({ file }: ChargeWrite, input: { reason: string; quarantine?: boolean }): string {
  const { charge, spare } = file;
  const { deliveredAh, plannedAh, groups } = charge.reckoning!.reckoning;
  const mean = groups.reduce((sum, group) => sum + group.restVolts, 0) / groups.length;
  const brought = `${Math.abs(deliveredAh).toFixed(1)} of ${ampHoursText(Math.abs(plannedAh))} ${charge.direction === 'discharge' ? 'out' : 'in'}, about ${mean.toFixed(2)}\u00a0V a group by reckoning.`;
  const then = input.quarantine
    ? `${spare.label} is in quarantine.`
    : `That is no reading: read ${spare.label} again before it is planned.`;
  return `Stopped: ${bare(input.reason)}. ${brought} ${then} ${titleOf(charge)} has no charge now.`;
}
