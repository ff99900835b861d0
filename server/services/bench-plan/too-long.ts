/** Whether a fill that somebody has taken still fits, once charges and hours have changed. */
import type { WorkStint } from '../../entities/work-stint';
import { clockText, durationText, lowerFirst } from '../charge-words';
import type { BenchGround } from './ground';
import type { HandBlock } from './hands';
import { overlaps, type Stretch } from './spans';

/** The clips go on and off when the plan says; a check or a fit can wait until the fill is done. */
const cannotWait = ({ kind, over }: HandBlock): boolean =>
  !over && (kind === 'clip-on' || kind === 'swap' || kind === 'clip-off');

/**
 * '12 min too long: clip off R-2411 at 14:40', '20 min too long: working hours end at 17:00'; null: it fits, or is over.
 * @param span when somebody is at it
 * @param hands what its person has to do besides
 */
export function tooLongText(
  { now, workshop }: BenchGround,
  { state }: WorkStint,
  span: Stretch,
  hands: readonly HandBlock[],
  present: readonly Stretch[],
): string | null {
  if (span.to <= now || (state !== 'taken' && state !== 'begun')) return null;
  const clock = (at: number) => clockText(at, workshop.zone, now);
  const ends = hands
    .filter((block) => cannotWait(block) && overlaps(block, span))
    .map((block) => ({
      // Where the clips come first it is to begin after them, and so much longer it takes.
      overMs: block.from > span.from ? span.to - block.from : block.to - span.from,
      why: `${lowerFirst(block.title)} at ${clock(block.from)}`,
    }));
  const here = present.find(({ from, to }) => from <= span.from && span.from < to);
  if (here && here.to < span.to)
    ends.push({ overMs: span.to - here.to, why: `working hours end at ${clock(here.to)}` });
  const [worst] = ends.sort((a, b) => b.overMs - a.overMs);
  // Less than a minute is the clock's own grain.
  return worst && worst.overMs >= 60_000 ? `${durationText(worst.overMs / 1000)} too long: ${worst.why}` : null;
}
