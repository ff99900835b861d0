/** From when to when a charge has its channels. */
import type { ChannelHold } from '../../entities/channel-hold';
import type { ChargeFile } from '../charge-file';
import { optionZeroAt } from '../charge-clock';
import { waitShiftMs } from '../charge-segments';
import { isWaitingToStart } from '../charge-stages';
import type { Stretch } from './spans';

export interface HeldSpan extends Stretch {
  channelId: string;
}

/**
 * The channels of a charge, past and to come: one that waits has its channel from the clip-on, one that runs until the likely
 * end of its current. What rests has let go of its channel: whoever clips on takes its clips off.
 */
export function heldSpans(file: ChargeFile, now: number): HeldSpan[] {
  const { charge, holds } = file;
  if (charge.startedAt === null && !isWaitingToStart(charge.stage)) return [];
  return holds
    .map((hold) => spanOf(file, hold, now))
    .filter((span) => span !== null)
    .filter(({ from, to }) => to > from);
}

function spanOf(file: ChargeFile, hold: ChannelHold, now: number): HeldSpan | null {
  const { charge } = file;
  const { channelId } = hold;
  if (hold.state === 'released')
    return hold.fromAt === null || hold.toAt === null ? null : { channelId, from: hold.fromAt, to: hold.toAt };
  const shift = waitShiftMs(file, now);
  if (hold.state === 'running')
    return {
      channelId,
      from: hold.fromAt ?? charge.startedAt ?? now,
      to: Math.max(now, (hold.toAt ?? charge.currentEndAt ?? now) + shift),
    };
  const zero = optionZeroAt(charge);
  const step = charge.option.steps[hold.stepIndex];
  const begin = step === undefined ? (hold.fromAt ?? zero) : zero + handsFromS(file, hold.stepIndex) * 1000;
  const end = step === undefined ? (hold.toAt ?? begin) : zero + step.stopS * 1000;
  return { channelId, from: Math.round(begin) + shift, to: Math.round(end) + shift };
}

/** Second of the option from which the hands are at the channel of a step. */
function handsFromS({ charge }: ChargeFile, stepIndex: number): number {
  const { option, frozen } = charge;
  const startS = option.steps[stepIndex]!.startS;
  const first = option.steps[0]!.startS;
  return startS <= first ? option.queueS : Math.max(option.queueS, startS - frozen.workshop.clipOnS);
}
