/** Instants that people give: when something was done at the bench, said now. */
import { fromInstant } from './instants';
import { clockText } from './charge-words';
import { invalid } from '../errors/domain-error';
import type { ChargeFile } from './charge-file';

/** A phone's clock may be this far off the server's, and who types the minute leaves its seconds out, ms. */
const CLOCK_SLACK_MS = 60_000;

/**
 * The instant of an act, epoch ms: the given one, else now. Not in the future, not before what it follows.
 * @param earliest what it must not lie before, with the words for it: 'the start'
 * @throws DomainError 400 at `at`
 */
export function actInstant(
  file: Pick<ChargeFile, 'workshop'>,
  given: string | undefined,
  now: number,
  earliest: { at: number; name: string },
): number {
  if (given === undefined) return Math.max(now, earliest.at);
  const at = fromInstant(given);
  const clock = (instant: number): string => clockText(instant, file.workshop.zone, now);
  if (at > now + CLOCK_SLACK_MS)
    throw invalid({ at: `${clock(at)} is still to come. Type when it was, or leave it empty for now.` });
  if (at < earliest.at - CLOCK_SLACK_MS)
    throw invalid({ at: `${clock(at)} lies before ${earliest.name} at ${clock(earliest.at)}. Type a later time.` });
  return Math.min(Math.max(at, earliest.at), Math.max(now, earliest.at));
}
