/** What a charge asks of people's hands: clip on, swap, clip off, check, and the fit after it. */
import type { BlockKind } from '@/shared/contract/bench-plan';
import type { ChargeFile } from '../charge-file';
import { optionZeroAt } from '../charge-clock';
import { waitShiftMs } from '../charge-segments';
import { isWaitingToStart } from '../charge-stages';
import { channelNamesOf, swapStarts } from '../charge-steps';
import { listText, titleOf } from '../charge-words';
import type { Stretch } from './spans';

export interface HandBlock extends Stretch {
  kind: Exclude<BlockKind, 'fill'>;
  title: string;
  chargeId: string;
  repairId: string | null;
  place: string | null;
  /** It has been done: it stands where it was. */
  over: boolean;
}

/** Hands in something that cannot be left; a fit and other work can be. */
export const binds = ({ kind }: HandBlock): boolean => kind !== 'fit';

const words: Record<HandBlock['kind'], string> = {
  'clip-on': 'Clip on',
  swap: 'Swap',
  'clip-off': 'Clip off',
  check: 'Check',
  fit: 'Fit',
};

/**
 * The hands of a charge in the order of time, what is to come as it is likely.
 * @param fit how long fitting takes, ms, and where; null: it belongs to no repair
 */
export function handsOf(file: ChargeFile, fit: { ms: number; bay: string | null } | null, now: number): HandBlock[] {
  const { charge } = file;
  if (charge.startedAt === null && !isWaitingToStart(charge.stage)) return [];
  const { clipOffS, checkS } = charge.frozen.workshop;
  const ends = charge.closedAt !== null && charge.stage !== 'fitted' ? charge.closedAt : Infinity;
  const block = (kind: HandBlock['kind'], from: number, ms: number, place: string | null): HandBlock => ({
    ...{ kind, from, to: from + ms, place, chargeId: charge.id, repairId: charge.repairId },
    title: `${words[kind]} ${titleOf(charge)}`,
    over: from + ms <= now || (charge.stage === 'fitted' && kind === 'fit'),
  });
  const blocks = roundsOf(file, now).map(({ from, to, place }, index) =>
    block(index === 0 ? 'clip-on' : 'swap', from, to - from, place),
  );
  const { currentEndAt, checkAt, readyAt } = endsOf(file, now);
  const channels = listText(channelNamesOf(file, charge.option.steps.length - 1));
  if (charge.option.channelIds.length > 0) blocks.push(block('clip-off', currentEndAt, clipOffS * 1000, channels));
  const checkMs = checkS * 1000;
  blocks.push(block('check', charge.readyAt === null ? checkAt : charge.readyAt - checkMs, checkMs, channels));
  if (fit !== null)
    blocks.push(
      charge.stage === 'fitted' && charge.closedAt !== null
        ? block(
            'fit',
            Math.max(readyAt, charge.closedAt - fit.ms),
            charge.closedAt - Math.max(readyAt, charge.closedAt - fit.ms),
            fit.bay,
          )
        : block('fit', Math.max(now, readyAt), fit.ms, fit.bay),
    );
  // Of what was taken off before its end nothing is to come.
  return blocks.filter((one) => one.to > one.from && one.to <= ends);
}

/** When the clips go on for each round of steps: as it was, and as planned for those to come. */
function roundsOf(file: ChargeFile, now: number): (Stretch & { place: string })[] {
  const { charge, runs } = file;
  const { option, frozen } = charge;
  const shift = waitShiftMs(file, now);
  const zero = optionZeroAt(charge);
  const begun = runs.filter((run, index) => index === 0 || runs[index - 1]!.reason === 'next step');
  return swapStarts(option).map((stepIndex, round) => {
    const count = option.steps.filter(
      (step, index) => index >= stepIndex && step.startS === option.steps[stepIndex]!.startS,
    ).length;
    const ms = count * frozen.workshop.clipOnS * 1000;
    const to = begun[round]?.fromAt ?? zero + Math.round(option.steps[stepIndex]!.startS * 1000) + shift;
    return { from: to - ms, to, place: listText(channelNamesOf(file, stepIndex)) };
  });
}

/** End of current, the check, and ready: as it was, else as it is likely. */
export function endsOf(file: ChargeFile, now: number): { currentEndAt: number; checkAt: number; readyAt: number } {
  const { charge } = file;
  const checkMs = charge.frozen.workshop.checkS * 1000;
  const shift = waitShiftMs(file, now);
  if (charge.startedAt === null) {
    const zero = charge.clipOnAt + shift;
    const readyAt = charge.plannedLikelyAt + shift;
    return { currentEndAt: zero + Math.round(charge.option.currentEndS * 1000), checkAt: readyAt - checkMs, readyAt };
  }
  const isDue = charge.stage === 'check-due';
  const checkAt = (charge.checkDueAt ?? charge.plannedLikelyAt - checkMs) + shift;
  const asked = isDue ? Math.max(now, checkAt) : checkAt;
  return {
    currentEndAt: (charge.currentEndAt ?? charge.plannedLikelyAt) + shift,
    checkAt: asked,
    readyAt: charge.readyAt ?? asked + checkMs,
  };
}
