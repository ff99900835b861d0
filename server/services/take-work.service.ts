/** Taking a piece of other work, and giving it to somebody. */
import type { TakeWorkInput, WorkDto } from '@/shared/contract/work';
import { leastPartMinutes } from '@/shared/contract/work-terms';
import type { Deps, Member } from '../deps';
import type { Work } from '../entities/work';
import type { WorkStint } from '../entities/work-stint';
import { conflict, invalid } from '../errors/domain-error';
import { findPerson } from '../repositories/people.repository';
import { personRefs } from '../repositories/person-refs.repository';
import { insertStint } from '../repositories/work.repository';
import { clockText } from './charge-words';
import { newId } from './ids';
import { presentAhead, spanOf, waitChargeOf } from './stint-span';
import { standing } from './work-file';
import { refuseElsewhere, refuseForOthers, refuseTakenPlace, refuseUnskilled } from './work-rules';
import { changeOneWork, type WorkWrite } from './work-write';

const GAP = '\u00a0';
/** A suggestion is tapped some moments after it was made: a beginning this far back is now, ms. */
const TAP_SLACK_MS = 5 * 60_000;

/**
 * Takes a piece of work or a part of it, or gives it to somebody.
 * @throws DomainError 403 to give without the right, 400 with the field at fault, 409 with what stands against it: nothing
 * left, a skill, a place that is taken, or what the person has then
 */
export const takeWork = (deps: Deps, member: Member, id: string, input: TakeWorkInput, now: number): Promise<WorkDto> =>
  changeOneWork(deps, member, id, now, {}, async (write) => {
    const { manager, file, workshop } = write;
    const { work } = file;
    const personId = input.personId ?? member.personId;
    await refuseForOthers(manager, member, personId);
    const person = await findPerson(manager, workshop.id, personId);
    if (!person || person.disabledAt !== null)
      throw invalid({ personId: 'This person is not on the list. Choose another.' });
    const from = beginningOf(write, input.from);
    await refuseNothingLeft(write);
    const part = partOf(work, input.minutes);
    await refuseUnskilled(write, work, personId);
    if (personId !== member.personId) await refuseAway(write, person, from);
    const span = await spanOf(write, personId, from, part.longMinutes);
    await refuseElsewhere(write, personId, span);
    await refuseTakenPlace(write, work.placeId, span);
    const stint: WorkStint = {
      ...{ id: newId(), workshopId: workshop.id, workId: work.id, personId },
      ...{ givenById: personId === member.personId ? null : member.personId, placeId: work.placeId },
      ...{ state: 'taken', fromAt: span.from, toAt: span.to, ...part, begunAt: null, endedAt: null },
      waitChargeId: await waitChargeOf(manager, workshop.id, personId, span),
    };
    await insertStint(manager, stint);
    work.leftMinutes -= part.likelyMinutes;
    work.leftLongMinutes -= part.longMinutes;
  });

function beginningOf({ workshop, now }: WorkWrite, typed: string | undefined): number {
  const from = typed === undefined ? now : Date.parse(typed);
  if (from < now - TAP_SLACK_MS)
    throw invalid({ from: `${clockText(from, workshop.zone, now)} is over. Take a time that is still to come.` });
  return Math.max(from, now);
}

/** @throws DomainError 409 with who has it */
async function refuseNothingLeft({ manager, file, workshop, now }: WorkWrite): Promise<void> {
  if (file.work.leftLongMinutes > 0) return;
  const [first] = standing(file);
  const who = (await personRefs(manager, workshop.id)).get(first?.personId ?? '')?.name ?? 'Somebody';
  const since = first ? clockText(first.fromAt, workshop.zone, now) : '';
  throw conflict(
    'nothing_left',
    first?.state === 'begun'
      ? `${who} is at it since ${since}. Nothing of it is left.`
      : `${who} has it from ${since}. Nothing of it is left.`,
  );
}

/**
 * What a part takes of the work, min: of the likely estimate its share by the long one. What nobody has in hand is always
 * taken whole.
 * @throws DomainError 400 at `minutes`
 */
export function partOf(
  work: Pick<Work, 'splittable' | 'leftMinutes' | 'leftLongMinutes'>,
  minutes: number | undefined,
): { likelyMinutes: number; longMinutes: number } {
  const { leftMinutes, leftLongMinutes } = work;
  const longMinutes = minutes ?? leftLongMinutes;
  if (longMinutes === leftLongMinutes) return { likelyMinutes: leftMinutes, longMinutes };
  if (!work.splittable)
    throw invalid({ minutes: `This is done in one go: ${leftLongMinutes}${GAP}min. Leave the minutes empty.` });
  if (longMinutes > leftLongMinutes)
    throw invalid({ minutes: `Only ${leftLongMinutes}${GAP}min of it are left. Type fewer.` });
  if (longMinutes < leastPartMinutes)
    throw invalid({ minutes: `A part is at least ${leastPartMinutes}${GAP}min. Type more, or take all of it.` });
  // A part with nothing likely in it, or a rest without, would count for nothing.
  const share = Math.round((leftMinutes * longMinutes) / leftLongMinutes);
  return { likelyMinutes: Math.min(Math.max(share, 1), Math.max(leftMinutes - 1, 0)), longMinutes };
}

/** Whoever takes work knows when they are there; whoever gives it may not. @throws DomainError 409 */
async function refuseAway(write: WorkWrite, person: { id: string; name: string }, from: number): Promise<void> {
  const [first] = await presentAhead(write, person.id, from);
  if (first && first.from <= from) return;
  const clock = (at: number): string => clockText(at, write.workshop.zone, write.now);
  const next = first ? ` The next time is ${clock(first.from)}.` : '';
  throw conflict('away', `${person.name} is not there at ${clock(from)}.${next}`);
}
