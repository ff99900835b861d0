/** What becomes of a stint: begun, ended, given back; and the stints that it pushes on. */
import type { EndStintInput, WorkDto } from '@/shared/contract/work';
import type { Deps, Member } from '../deps';
import type { WorkStint } from '../entities/work-stint';
import { conflict, notFound } from '../errors/domain-error';
import { listStandingStints, updateStint } from '../repositories/work.repository';
import { clockText } from './charge-words';
import { presentAhead, spanOf, waitChargeOf } from './stint-span';
import { loadWorkFile, standing, type WorkFile } from './work-file';
import { refuseForOthers, refuseTakenPlace, takenPlace } from './work-rules';
import { workName } from './work-words';
import { changeOneWork, saveWork, type Acting, type WorkWrite } from './work-write';

/** A stretch ends after it begins, also where somebody taps twice at once, ms. */
const SHORTEST_MS = 1000;

/** One act on a stint of a piece of work, by its person or by who plans the bench. @throws DomainError 404, 403 */
const changeStint = (
  deps: Deps,
  member: Member,
  id: string,
  stintId: string,
  now: number,
  act: (write: WorkWrite, stint: WorkStint) => Promise<void>,
): Promise<WorkDto> =>
  changeOneWork(deps, member, id, now, {}, async (write) => {
    const stint = write.file.stints.find((one) => one.id === stintId);
    if (!stint) throw notFound('This stint');
    await refuseForOthers(write.manager, member, stint.personId);
    await act(write, stint);
  });

/** Writes what has changed of a stint. */
async function put({ manager, workshop }: Acting, stint: WorkStint, change: Partial<WorkStint>): Promise<void> {
  Object.assign(stint, change);
  await updateStint(manager, workshop.id, stint.id, change);
}

/**
 * Begins a stint, whenever it was planned: it lies from now on, and what else the person has taken moves behind it.
 * @throws DomainError 409 where it is over, the person is at other work, or the place is taken
 */
export const beginStint = (deps: Deps, member: Member, id: string, stintId: string, now: number): Promise<WorkDto> =>
  changeStint(deps, member, id, stintId, now, async (write, stint) => {
    if (stint.state === 'begun') return;
    refuseEnded(write, stint);
    const { manager, workshop } = write;
    const others = await listStandingStints(manager, workshop.id, stint.personId);
    const begun = others.find(({ state }) => state === 'begun');
    if (begun) {
      const { work } = await loadWorkFile(manager, workshop.id, begun.workId);
      const since = clockText(begun.fromAt, workshop.zone, now);
      throw conflict('at_work', `${workName(work)} is begun since ${since}. End it first, or give it back.`);
    }
    const span = await spanOf(write, stint.personId, now, stint.longMinutes);
    await refuseTakenPlace(write, stint.placeId, span, stint.id);
    const waitChargeId = await waitChargeOf(manager, workshop.id, stint.personId, span);
    await put(write, stint, { state: 'begun', begunAt: now, fromAt: span.from, toAt: span.to, waitChargeId });
    await pushOn(write, stint, span.to);
  });

/**
 * Ends a stint: it is done, or with minutes left only a part of it, and the rest is open again. Where nothing is left and
 * nobody has any of it in hand, the work is done.
 * @throws DomainError 409 where it was given back, or is still to come
 */
export const endStint = (
  deps: Deps,
  member: Member,
  id: string,
  stintId: string,
  input: EndStintInput,
  now: number,
): Promise<WorkDto> =>
  changeStint(deps, member, id, stintId, now, async (write, stint) => {
    if (stint.state === 'done') return;
    refuseEnded(write, stint);
    const { file, workshop } = write;
    if (stint.state === 'taken' && stint.fromAt > now) {
      const begins = clockText(stint.fromAt, workshop.zone, now);
      throw conflict('wrong_state', `It is planned for ${begins} and not begun. Begin it first, or give it back.`);
    }
    const { work } = file;
    const left = input.minutesLeft ?? 0;
    const leftLong = Math.ceil((left * work.longMinutes) / work.likelyMinutes);
    await put(write, stint, {
      state: 'done',
      begunAt: stint.begunAt ?? stint.fromAt,
      endedAt: now,
      toAt: Math.max(now, stint.fromAt + SHORTEST_MS),
      likelyMinutes: Math.max(0, stint.likelyMinutes - left),
      longMinutes: Math.max(0, stint.longMinutes - leftLong),
    });
    work.leftMinutes += left;
    work.leftLongMinutes += leftLong;
    if (work.leftLongMinutes === 0 && standing(file).length === 0)
      Object.assign(work, { overAt: now, overById: member.personId, dropReason: null });
    await pushOn(write, stint, stint.toAt);
  });

/** Gives a stint back: what it took of the work is open again. Taking it once more undoes it. @throws DomainError 409 */
export const giveBack = (deps: Deps, member: Member, id: string, stintId: string, now: number): Promise<WorkDto> =>
  changeStint(deps, member, id, stintId, now, async (write, stint) => {
    if (stint.state === 'given-back') return;
    refuseEnded(write, stint);
    await returnStint(write, write.file, stint);
  });

/** What a stint took of its work is open again. The work's own row is the caller's to write. */
export async function returnStint(acting: Acting, { work }: WorkFile, stint: WorkStint): Promise<void> {
  const { now } = acting;
  work.leftMinutes += stint.likelyMinutes;
  work.leftLongMinutes += stint.longMinutes;
  await put(acting, stint, {
    state: 'given-back',
    endedAt: now,
    ...(stint.state === 'begun' ? { toAt: Math.max(now, stint.fromAt + SHORTEST_MS) } : {}),
  });
}

function refuseEnded({ workshop, now }: WorkWrite, stint: WorkStint): void {
  if (stint.endedAt === null) return;
  const at = clockText(stint.endedAt, workshop.zone, now);
  throw conflict('wrong_state', stint.state === 'done' ? `It was done at ${at}.` : `It was given back at ${at}.`);
}

/**
 * Nobody is in two places: what a person has taken for a time that another stint of theirs now has moves behind it, one
 * after the other, each to a time at which they are there. Where its place is not free then, it is given back.
 */
async function pushOn(write: WorkWrite, stint: WorkStint, until: number): Promise<void> {
  const { manager, workshop } = write;
  const { personId } = stint;
  const ahead = (await listStandingStints(manager, workshop.id, personId)).filter(
    (one) => one.state === 'taken' && one.id !== stint.id && one.toAt > stint.fromAt,
  );
  let free = until;
  for (const next of ahead) {
    if (next.fromAt >= free) continue;
    const [present] = await presentAhead(write, personId, free);
    const span = await spanOf(write, personId, Math.max(free, present?.from ?? free), next.longMinutes);
    // The piece that the act is about is written by its own change.
    const same = next.workId === stint.workId;
    const file = same ? write.file : await loadWorkFile(manager, workshop.id, next.workId);
    if ((await takenPlace(write, next.placeId, span, next.id)) === null) {
      const waitChargeId = await waitChargeOf(manager, workshop.id, personId, span);
      await put(write, next, { fromAt: span.from, toAt: span.to, waitChargeId });
      free = span.to;
    } else await returnStint(write, file, next);
    if (!same) await saveWork(manager, file);
  }
}
