/**
 * The steps of a charge as a hand meets them. Steps that begin together (several channels side by side) are one swap;
 * every later one is begun by a hand, and the run stretches say which.
 */
import type { PlannedStep, PlanOption } from '@/calc/plan-types';
import type { RunStretch } from '../entities/run-stretch';
import type { ChargeFile } from './charge-file';
import { channelNamesOf, groupsText, listText } from './charge-words';

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

/** What the hand does for a step: 'Swap B1 to group 2'. */
export function handText(file: Pick<ChargeFile, 'charge' | 'channels'>, stepIndex: number): string {
  const { steps } = file.charge.option;
  const step = steps[stepIndex]!;
  const before = steps[stepIndex - 1];
  const names = channelNamesOf(file, stepIndex);
  const where = stepPlace(step, file.charge.option.endGroupVolts.length);
  if (names.length === 0) return `Put the resistor across ${where}`;
  const moved = before !== undefined && names.every((_, index) => before.channelIds.includes(step.channelIds[index]!));
  const joins = step.way === 'paralleled' && before !== undefined && before.kind === 'pre-level';
  if (joins) return `Join the groups and clip on ${listText(names)}`;
  return `${moved ? 'Swap' : 'Clip'} ${listText(names)} ${moved ? 'to' : 'on'} ${where}`;
}

function stepPlace(step: PlannedStep, groupCount: number): string {
  if (step.way === 'terminals' && step.groupIndexes.length === groupCount) return 'the terminals';
  if (step.way === 'paralleled') return 'the joined groups';
  return groupsText(step.groupIndexes);
}
