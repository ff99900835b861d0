import type { WeeklyDigestDto } from '@/shared/contract/weekly-digest';
import type { Deps, Member } from '../../deps';
import { notFound } from '../../errors/domain-error';
import { findPerson } from '../../repositories/people.repository';
import { personById, resumeDigest, stopDigest, wantsDigest } from '../../repositories/weekly-digest.repository';
import { inTransaction } from '../unit-of-work';
import { personOfToken } from './digest-letter';

/** Whether the weekly digest comes to who asks. */
export async function weeklyDigest(deps: Deps, { workshopId, personId }: Member): Promise<WeeklyDigestDto> {
  const { manager } = deps.dataSource;
  const person = await findPerson(manager, workshopId, personId);
  if (!person) throw notFound('This person');
  const on = await wantsDigest(manager, workshopId, personId);
  return { on, eMail: { address: person.email, on: deps.outbox.eMail } };
}

/** Switches it on or off. */
export async function changeWeeklyDigest(
  deps: Deps,
  member: Member,
  { on }: { on: boolean },
  now: number,
): Promise<WeeklyDigestDto> {
  const { workshopId, personId } = member;
  await inTransaction(deps, (manager) =>
    on ? resumeDigest(manager, workshopId, personId) : stopDigest(manager, workshopId, personId, now),
  );
  return weeklyDigest(deps, member);
}

/**
 * Ends it by the link of a letter, without signing in.
 * @throws DomainError 404 where the link is none of ours
 */
export async function stopDigestByLink(deps: Deps, token: string, now: number): Promise<void> {
  const personId = personOfToken(deps.secrets, token);
  const person = personId === null ? null : await personById(deps.dataSource.manager, personId);
  if (!person) throw notFound('This link');
  await inTransaction(deps, (manager) => stopDigest(manager, person.workshopId, person.id, now));
}

/** Whether a link is one of ours: what it opens asks once more, since programs look at links too. */
export const isDigestLink = (deps: Deps, token: string): boolean => personOfToken(deps.secrets, token) !== null;

const page = (title: string, body: string): string =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${title}</title></head><body><h1>${title}</h1>${body}</body></html>`;

/** The page of a link: a button, which is pressed by people only. */
export const askPage = (token: string): string =>
  page(
    'Weekly digest',
    `<form method="post" action="/api/digest/stop?token=${encodeURIComponent(token)}"><p>No more letters about the waits of the week?</p><button type="submit">No more letters</button></form>`,
  );
export const stoppedPage = page(
  'Weekly digest',
  '<p>You get no more of these letters. You can switch them on again in Bidewell.</p>',
);
