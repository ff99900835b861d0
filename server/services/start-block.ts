import type { EntityManager } from 'typeorm';
import type { Member } from '../deps';
import type { Spare } from '../entities/spare';
import { conflict, type DomainError } from '../errors/domain-error';
import { runningHoldsOn } from '../repositories/charge-rows.repository';
import { chargeNames, findOpenChargeOfSpare } from '../repositories/charges.repository';
import { lastMoveOf } from '../repositories/spare-moves.repository';
import { findLastSpareReading, findSpare } from '../repositories/spares.repository';
import { sheetBlock, type CheckSheet } from './charge-checks';
import { loadFile, type ChargeFile } from './charge-file';
import { stepsOfSwap } from './charge-steps';
import { titleOf } from './charge-words';
import { correctedVolts } from './meter-trust';
import { readsOtherwise } from './reads-otherwise';
import { lastChange, toldBy } from './who-changed';

export interface ChannelHolder {
  channelName: string;
  chargeId: string;
  title: string;
  stage: string;
}

/** The charges that run on the channels of a step now, but this one. */
export async function holdersOfStep(
  manager: EntityManager,
  file: ChargeFile,
  stepIndex: number,
): Promise<ChannelHolder[]> {
  const { charge, channels } = file;
  const ids = stepsOfSwap(charge.option, stepIndex).flatMap((index) => charge.option.steps[index]!.channelIds);
  const running = await runningHoldsOn(manager, charge.workshopId, ids);
  const holds = running.filter((hold) => hold.chargeId !== charge.id);
  const names = await chargeNames(
    manager,
    charge.workshopId,
    holds.map((hold) => hold.chargeId),
  );
  return holds.map((hold) => {
    const holder = names.get(hold.chargeId)!;
    const channelName = channels.get(hold.channelId)?.name ?? 'The channel';
    return { channelName, chargeId: holder.id, title: titleOf(holder), stage: holder.stage };
  });
}

const takenText = (holder: ChannelHolder): string =>
  `${holder.channelName} is taken by ${holder.title}. Wait until it is free, or plan on another channel.`;

/** 409: a channel of the step runs another charge; with who put it there. */
export async function channelTaken(
  { manager, member, now }: { manager: EntityManager; member: Member; now: number },
  holder: ChannelHolder,
): Promise<DomainError> {
  const { chargeId, title, stage, channelName } = holder;
  const other = await loadFile(manager, member.workshopId, chargeId);
  const taken = await lastChange(manager, other, member, now, ['started', 'next-step']);
  return toldBy(conflict('channel_taken', takenText(holder), { chargeId, title, stage, channelName }), taken);
}

/** Sentence why the timer cannot be started now; null: it can. */
export async function startBlock(manager: EntityManager, file: ChargeFile, sheet: CheckSheet): Promise<string | null> {
  const block = sheetBlock(sheet);
  if (block) return block.text;
  const [holder] = await holdersOfStep(manager, file, 0);
  return holder ? takenText(holder) : neighbourBlock(manager, file);
}

/**
 * Sentence why the spare that a resistor joins to this one is not what it was planned with; null: it is, or none is
 * joined.
 */
export async function neighbourBlock(manager: EntityManager, file: ChargeFile): Promise<string | null> {
  const { charge } = file;
  const { workshopId, neighbourSpareId } = charge;
  if (neighbourSpareId === null) return null;
  const neighbour = await findSpare(manager, workshopId, neighbourSpareId);
  const name = neighbour?.label ?? 'The spare it is joined to';
  const instead = 'Plan another way.';
  if (!neighbour || neighbour.fittedAt !== null) return `${name} is no longer in stock. ${instead}`;
  if (neighbour.quarantinedAt !== null || neighbour.condition !== 'sound') return `${name} is set aside. ${instead}`;
  const own = await findOpenChargeOfSpare(manager, workshopId, neighbourSpareId);
  if (own) return `${name} is on ${titleOf(own)} itself. ${instead}`;
  const moved = await lastMoveOf(manager, workshopId, neighbourSpareId);
  return moved && moved.until > charge.createdAt
    ? `${name} has been moved by ${titleOf(moved.charge)} since this was planned. ${instead}`
    : neighbourReads(manager, file, neighbour);
}

/** The same where the joined spare was read since the plan, and reads something else. */
async function neighbourReads(
  manager: EntityManager,
  { charge, meters }: ChargeFile,
  neighbour: Spare,
): Promise<string | null> {
  const planned = charge.frozen.neighbour;
  const reading = await findLastSpareReading(manager, charge.workshopId, neighbour.id);
  if (planned === null || reading === null || reading.createdAt <= charge.createdAt) return null;
  const volts = correctedVolts(reading.groupVolts, meters.get(reading.meterId ?? '') ?? null);
  return readsOtherwise(neighbour.label, planned.groupVolts, volts, charge.toleranceVolts);
}
