/** A charge planned again in its own way on other channels. Runs in the bench plan's thread. */
import { planCharge } from '@/calc/index';
import type { ChargePlan, PlanInput, PlanOption } from '@/calc/plan-types';
import type { Alternatives, WayInput } from './bench-tasks';

/** Its own way alone; one that ends outside the tolerance is nothing to move a charge to. */
function optionsOf({ input, way, finish, knownEnd }: WayInput): { plan: ChargePlan; options: PlanOption[] } {
  const plan = planCharge(input, { way, finish });
  const options = plan.options.filter(
    (option) =>
      option.way === way &&
      option.finish === finish &&
      (option.knownEnd ?? null) === knownEnd &&
      option.channelIds.length > 0 &&
      option.withinTolerance,
  );
  return { plan, options };
}

/** What the charge takes on each channel, and why those that cannot do it cannot. */
export function alternativesOf(ask: WayInput): Alternatives {
  const { plan, options } = optionsOf(ask);
  const because: Record<string, string> = {};
  const [refusal] = plan.refusals;
  for (const channel of ask.input.channels) {
    const { channelId } = channel;
    if (options.some((option) => option.channelIds.includes(channelId))) continue;
    const found = plan.ruledOut.find((one) => one.channelId === channelId && one.way === ask.way);
    because[channelId] =
      refusal?.text ??
      found?.reason ??
      (plan.alreadyWithin
        ? 'It is within the tolerance already: there is nothing to charge.'
        : `${channel.name} does not bring every group within the tolerance this way.`);
  }
  return {
    options: options.map(({ id, channelIds, currentEndS, totalS }) => ({
      optionId: id,
      channelIds: [...new Set(channelIds)],
      busyS: currentEndS,
      totalS,
    })),
    because,
  };
}

/** The option on exactly these channels, with all that a charge keeps of it; null: it is none of its ways any more. */
export function optionOn(ask: WayInput, channelIds: readonly string[]): PlanOption | null {
  const wanted = new Set(channelIds);
  const isOn = (ids: readonly string[]): boolean =>
    ids.every((id) => wanted.has(id)) && [...wanted].every((id) => ids.includes(id));
  const only: PlanInput = {
    ...ask.input,
    channels: ask.input.channels.filter(({ channelId }) => wanted.has(channelId)),
  };
  return optionsOf({ ...ask, input: only }).options.find((option) => isOn(option.channelIds)) ?? null;
}
