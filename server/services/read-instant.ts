/** A phone's clock may be this far ahead, ms. */
const CLOCK_SLACK_MS = 5 * 60_000;

/** When something was read, epoch ms; a time that is still to come is noted at the field `at`. */
export function readAt(typed: string | undefined, now: number, fields: Record<string, string>): number {
  const at = typed === undefined ? now : Date.parse(typed);
  if (at > now + CLOCK_SLACK_MS) fields.at = 'This time is still to come. Type when it was read.';
  return Math.min(at, now);
}
