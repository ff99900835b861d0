import type { EntityManager } from 'typeorm';
import type { ChannelHold } from '../entities/channel-hold';
import type { Charge } from '../entities/charge';
import { runningHoldsOn, updateHold } from '../repositories/charge-rows.repository';
import type { ChargeFile } from './charge-file';
import { isRunning, isWaitingToStart, swapWait } from './charge-stages';
import { begunStep, stepsOfSwap } from './charge-steps';
import { newId } from './ids';

/** Every step's channels, reserved for the time that the plan of a charge gives them. */
export function reservedHolds(charge: Charge): ChannelHold[] {
  const at = (seconds: number): number => charge.clipOnAt + Math.round(seconds * 1000);
  return charge.option.steps.flatMap((step, stepIndex) =>
    step.channelIds.map((channelId) => ({
      id: newId(),
      workshopId: charge.workshopId,
      chargeId: charge.id,
      stepIndex,
      channelId,
      state: 'reserved' as const,
      fromAt: at(step.startS),
      toAt: at(step.stopS),
    })),
  );
}

type HoldState = Pick<ChannelHold, 'state' | 'toAt'>;

/** What a hold ought to be by the stage of its charge. A channel that a later step needs again is kept over the swap. */
function wantedState(file: ChargeFile, hold: ChannelHold, now: number): HoldState {
  const { charge } = file;
  const { option } = charge;
  if (isWaitingToStart(charge.stage)) return { state: 'reserved', toAt: hold.toAt };
  const open = isRunning(charge.stage) || charge.stage === 'held';
  if (!open) {
    const end = charge.stage === 'stopped' ? charge.stoppedAt : charge.currentEndAt;
    return { state: 'released', toAt: hold.state === 'released' ? hold.toAt : (end ?? now) };
  }
  const begun = begunStep(option, file.runs);
  if (hold.stepIndex < begun)
    return { state: 'released', toAt: hold.state === 'released' ? hold.toAt : (file.runs.at(-1)?.fromAt ?? now) };
  if (!stepsOfSwap(option, begun).includes(hold.stepIndex)) return { state: 'reserved', toAt: hold.toAt };
  const wait = swapWait(file);
  const neededLater = option.steps.some((step, index) => index > begun && step.channelIds.includes(hold.channelId));
  if (wait !== null && !neededLater)
    return { state: 'released', toAt: hold.state === 'released' ? hold.toAt : wait.since };
  return { state: 'running', toAt: null };
}

/**
 * Brings the channels of a charge to what its stage needs: released first, then taken.
 *
 * The unique index says whether a channel is free. A release that a late reading takes back does not take the channel
 * from somebody who has begun on it meanwhile.
 * @returns whether any channel has changed hands
 */
export async function syncHolds(manager: EntityManager, file: ChargeFile, now: number): Promise<boolean> {
  const { charge } = file;
  const changes = file.holds
    .map((hold) => ({ hold, wanted: wantedState(file, hold, now) }))
    .filter(({ hold, wanted }) => hold.state !== wanted.state || hold.toAt !== wanted.toAt)
    .sort((one, other) => Number(one.wanted.state === 'running') - Number(other.wanted.state === 'running'));
  for (const { hold, wanted } of changes) {
    if (wanted.state === 'running' && hold.state === 'released') {
      const holders = await runningHoldsOn(manager, charge.workshopId, [hold.channelId]);
      if (holders.length > 0) continue;
    }
    const fromAt = wanted.state === 'running' && hold.state === 'reserved' ? beginOf(file) : hold.fromAt;
    const unused = wanted.state === 'released' && hold.state === 'reserved';
    const patch = { ...wanted, fromAt: unused ? null : fromAt, toAt: unused ? null : wanted.toAt };
    await updateHold(manager, charge.workshopId, hold.id, patch);
    Object.assign(hold, patch);
  }
  return changes.length > 0;
}

/** Begin of the stretch that runs. */
const beginOf = ({ charge, runs }: ChargeFile): number | null => runs.at(-1)?.fromAt ?? charge.startedAt;
