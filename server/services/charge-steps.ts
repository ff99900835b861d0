/**
 * The steps of a charge as a hand meets them. Steps that begin together (several channels side by side) are one swap;
 * every later one is begun by a hand, and the run stretches say which.
 */
import type { PlannedStep, PlanOption } from '@/calc/plan-types';
import type { RunStretch } from '../entities/run-stretch';
import type { ChargeFile } from './charge-file';
import { groupsText, listText, titleOf } from './charge-words';

/** Ends a run stretch because the clips go to the next step. */
export const SWAP_REASON = 'next step';

/** Steps that begin within this of each other are begun by the same hand, s. */
const TOGETHER_S = 1;

/** Index of the first step of each swap, in the order in which they are begun. */
export function swapStarts(option: Pick<PlanOption, 'steps'>): number[] {
  const starts: number[] = [];
  option.steps.forEach((step, index) => {
    const before = starts.at(-1);
    if (before === undefined || step.startS - option.steps[before]!.startS > TOGETHER_S) starts.push(index);
  });
  return starts;
}

/** The steps that are begun together with step `first`. */
export function stepsOfSwap(option: Pick<PlanOption, 'steps'>, first: number): number[] {
  const starts = swapStarts(option);
  const next = starts.find((index) => index > first) ?? option.steps.length;
  return Array.from({ length: next - first }, (_, offset) => first + offset);
}

/** First step of the swap that was made last; 0 before the start and until the first swap. */
export function begunStep(option: Pick<PlanOption, 'steps'>, runs: readonly Pick<RunStretch, 'reason'>[]): number {
  const made = runs.filter((run) => run.reason === SWAP_REASON).length;
  const starts = swapStarts(option);
  return starts[Math.min(made, starts.length - 1)] ?? 0;
}

/** First step of the swap that comes next; null: the last one is begun. */
export function nextSwap(
  option: Pick<PlanOption, 'steps'>,
  runs: readonly Pick<RunStretch, 'reason'>[],
): number | null {
  const begun = begunStep(option, runs);
  return swapStarts(option).find((index) => index > begun) ?? null;
}

/** The step each run stretch belongs to. */
export function stepOfEachRun(option: Pick<PlanOption, 'steps'>, runs: readonly RunStretch[]): number[] {
  return runs.map((_, index) => begunStep(option, runs.slice(0, index)));
}

/** Names of the channels that run with a step, those side by side with it too; empty for a resistor alone. */
export function channelNamesOf(file: Pick<ChargeFile, 'charge' | 'channels'>, stepIndex: number): string[] {
  const { option } = file.charge;
  const ids = roundOf(option, stepIndex).flatMap((index) => option.steps[index]!.channelIds);
  return [...new Set(ids)].map((id) => nameOf(file, id));
}

const nameOf = (file: Pick<ChargeFile, 'channels'>, id: string): string =>
  file.channels.get(id)?.name ?? 'a channel that is gone';

/** The steps begun together with this one, whichever of them it is. */
function roundOf(option: Pick<PlanOption, 'steps'>, stepIndex: number): number[] {
  const first = swapStarts(option).findLast((start) => start <= stepIndex);
  return first === undefined ? [] : stepsOfSwap(option, first);
}

/** 'R-2406 at B2'; without a channel its title alone. */
export function titleAtChannel(file: Pick<ChargeFile, 'charge' | 'channels'>, stepIndex: number): string {
  const names = channelNamesOf(file, stepIndex);
  return names.length === 0 ? titleOf(file.charge) : `${titleOf(file.charge)} at ${listText(names)}`;
}

/** What the hand does for a step: 'Swap B1 to group 2', 'Swap A1 to group 3 and C1 to group 4'. */
export function handText(file: Pick<ChargeFile, 'charge' | 'channels'>, stepIndex: number): string {
  const { option } = file.charge;
  const { steps } = option;
  const step = steps[stepIndex]!;
  const before = roundOf(option, stepIndex - 1).flatMap((index) => steps[index]!.channelIds);
  if (step.channelIds.length === 0) return `Put the resistor across ${stepPlace(file, step)}`;
  if (step.way === 'paralleled' && steps[stepIndex - 1]?.kind === 'pre-level')
    return `Join the groups and clip on ${listText(channelNamesOf(file, stepIndex))}`;
  const parts = stepsOfSwap(option, stepIndex).map((index) => {
    const one = steps[index]!;
    const names = listText(one.channelIds.map((id) => nameOf(file, id)));
    const moved = one.channelIds.every((id) => before.includes(id));
    return { verb: moved ? 'Swap' : 'Clip', text: `${names} ${moved ? 'to' : 'on'} ${stepPlace(file, one)}` };
  });
  return listText(
    parts.map(({ verb, text }, place) => {
      if (place === 0) return `${verb} ${text}`;
      return verb === parts[place - 1]!.verb ? text : `${verb.toLowerCase()} ${text}`;
    }),
  );
}

function stepPlace({ charge }: Pick<ChargeFile, 'charge'>, step: PlannedStep): string {
  if (step.way === 'terminals' && step.groupIndexes.length === charge.frozen.module.groupsInSeries)
    return 'the terminals';
  if (step.way === 'paralleled') return 'the joined groups';
  return groupsText(step.groupIndexes);
}
