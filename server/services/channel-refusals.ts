import type { PlannedStep, Refusal } from '@/calc/plan-types';
import type { Channel } from '../entities/channel';
import { faultWords, isFaulty } from './channel-fault';
import type { ChargeFile } from './charge-file';
import { clipText, groupsText, setVoltsText, upperFirst } from './charge-words';

/** What a channel may give over the planned and still be the same, V. */
const ROUNDING_VOLTS = 1e-6;

/**
 * The channels of every step as they are now against what was planned with them: somebody may have changed the
 * equipment since. One sentence a channel; a trim is looked at before the bulk begins, not when it is too late to plan.
 */
export function channelRefusals(file: ChargeFile): Refusal[] {
  const texts = new Map<string, string>();
  file.charge.option.steps.forEach((step, index) => {
    for (const id of step.channelIds) {
      const text = texts.has(id) ? null : problemOf(file, step, index, file.channels.get(id));
      if (text !== null) texts.set(id, text);
    }
  });
  return [...texts.values()].map((text) => ({ code: 'ceiling', group: null, text }));
}

function problemOf(
  { charge }: ChargeFile,
  step: PlannedStep,
  index: number,
  channel: Channel | undefined,
): string | null {
  if (!channel || channel.retired)
    return `${channel?.name ?? 'Its channel'} is out of use. Plan it again on another channel.`;
  if (isFaulty(channel)) return `${faultWords(channel)} Plan it on another channel.`;
  if (step.direction === 'discharge')
    return channel.canDischarge ? null : `${channel.name} cannot discharge any more. Plan it on another channel.`;
  if (channel.adjustableVolts) return null;
  const gives = `${channel.name} gives ${clipText(channel.maxVolts)} and cannot be set lower.`;
  const cap = charge.option.setVoltsCap;
  // The cap of the option is that of its first step; every later one was planned to its own set voltage.
  if (index === 0)
    return cap !== null && channel.maxVolts > cap + ROUNDING_VOLTS
      ? `${gives} ${clipText(cap)} is the most that keeps a forgotten charge safe. Plan it on another channel.`
      : null;
  return step.setVolts !== null && channel.maxVolts > step.setVolts + ROUNDING_VOLTS
    ? `${gives} ${upperFirst(groupsText(step.groupIndexes))} ${step.groupIndexes.length === 1 ? 'takes' : 'take'} ${setVoltsText(step.setVolts, 'charge')} from it at most. Plan it on another channel.`
    : null;
}
