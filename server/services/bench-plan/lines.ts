/** The line of one person: what they have to do laid one after the other, and what is free between. */
import type { HandBlock } from './hands';
import { common, earliestBegin, without, type Stretch } from './spans';

/** A free stretch below this is the walk from one thing to the next, ms. */
const LEAST_FREE_MS = 10 * 60_000;

/** A check or a fit waits until somebody is there; the clips go on and off when the plan says. */
const waitsForPerson = ({ kind }: HandBlock): boolean => kind === 'check' || kind === 'fit';

/**
 * Puts the hands of a person's charges after each other: nobody is in two places. What is over stands where it was; a check
 * or a fit moves into the person's hours, and a fit comes after its check.
 * @param kept stretches that are taken by something else, which nothing here moves
 */
export function laidOut(
  blocks: readonly HandBlock[],
  kept: readonly Stretch[],
  present: readonly Stretch[],
): HandBlock[] {
  const laid = blocks.filter(({ over }) => over);
  const coming = blocks.filter(({ over }) => !over).sort((a, b) => a.from - b.from);
  const after = new Map<string, number>();
  // What cannot wait is laid first; a fit gives way to the next clip-on.
  for (const block of [...coming.filter((one) => !waitsForPerson(one)), ...coming.filter(waitsForPerson)]) {
    const ms = block.to - block.from;
    const notBefore = Math.max(block.from, after.get(block.chargeId) ?? -Infinity);
    const begins = waitsForPerson(block)
      ? earliestBegin(
          present.filter(({ from, to }) => to - from >= ms).map(({ from, to }) => ({ from, to: to - ms })),
          block.kind === 'fit' ? [...laid, ...kept] : laid,
          ms,
          notBefore,
        )
      : earliestBegin([{ from: block.from, to: Infinity }], laid, ms);
    const from = begins ?? notBefore;
    laid.push({ ...block, from, to: from + ms });
    if (block.kind === 'check') after.set(block.chargeId, from + ms);
  }
  return laid.sort((a, b) => a.from - b.from || a.to - b.to);
}

/** What is left of a person's hours from `from` on. */
export const freeIn = (present: readonly Stretch[], taken: readonly Stretch[], window: Stretch): Stretch[] =>
  without(common(present, [window]), taken).filter(({ from, to }) => to - from >= LEAST_FREE_MS);
