/** What stands against somebody doing a piece of work somewhere at some time. */
import type { EntityManager } from 'typeorm';
import { leastRoleWith } from '@/shared/contract/roles';
import type { Member } from '../deps';
import type { Work } from '../entities/work';
import type { WorkStint } from '../entities/work-stint';
import { conflict, forbidden } from '../errors/domain-error';
import { listPeople } from '../repositories/people.repository';
import { personRefs } from '../repositories/person-refs.repository';
import { placesById } from '../repositories/places.repository';
import { skillsById } from '../repositories/skills.repository';
import { findStaffing, staffingByPerson } from '../repositories/staffing.repository';
import { findWork, listStints } from '../repositories/work.repository';
import { clockText, listText } from './charge-words';
import { may } from './may';
import type { SpanMs } from './presence';
import { workName } from './work-words';
import type { Acting } from './work-write';

/** Work in another's hands is a matter of who plans the bench. @throws DomainError 403 */
export async function refuseForOthers(manager: EntityManager, member: Member, personId: string): Promise<void> {
  if (personId === member.personId || (await may(manager, member, 'bench:plan'))) return;
  throw forbidden(
    `To give work to others, or to change what they have, needs the role ${leastRoleWith('bench:plan')}. You are signed in as ${member.role}.`,
  );
}

/** @throws DomainError 409 with who has the skill */
export async function refuseUnskilled(
  { manager, workshop }: Acting,
  work: Pick<Work, 'skillId'>,
  personId: string,
): Promise<void> {
  if (work.skillId === null) return;
  const staffing = await findStaffing(manager, workshop.id, personId);
  if (staffing?.skillIds.includes(work.skillId)) return;
  const skill = (await skillsById(manager, workshop.id)).get(work.skillId)?.name ?? '';
  const name = (await personRefs(manager, workshop.id)).get(personId)?.name ?? '';
  const rows = await staffingByPerson(manager, workshop.id);
  const able = (await listPeople(manager, workshop.id)).filter(
    (one) => one.disabledAt === null && rows.get(one.id)?.skillIds.includes(work.skillId!),
  );
  const who =
    able.length === 0
      ? 'Nobody has it yet: a manager writes it down for them.'
      : `${listText(able.map((one) => one.name))} ${able.length === 1 ? 'has' : 'have'} it.`;
  throw conflict('no_skill', `This needs the skill ${skill}, which ${name} does not have. ${who}`);
}

/** Begun work lasts until somebody ends it: it is in the way of what would begin now, also past its planned end. */
const lasting = (stint: WorkStint, now: number): SpanMs => ({
  from: stint.fromAt,
  to: stint.state === 'begun' ? Math.max(stint.toAt, now + 1) : stint.toAt,
});

const overlaps = (one: SpanMs, other: SpanMs): boolean => one.from < other.to && other.from < one.to;

/** Stints of anybody, taken or begun, that overlap a span; without the one that is moved. */
async function inTheWay({ manager, workshop, now }: Acting, span: SpanMs, exceptId: string | null) {
  const stints = await listStints(manager, workshop.id, span.from, span.to);
  return stints.filter(
    (one) =>
      (one.state === 'taken' || one.state === 'begun') && one.id !== exceptId && overlaps(span, lasting(one, now)),
  );
}

/** The stint for which a place is not free in a span; null: it is free, or none is needed. */
export async function takenPlace(
  acting: Acting,
  placeId: string | null,
  span: SpanMs,
  exceptId: string | null,
): Promise<WorkStint | null> {
  if (placeId === null) return null;
  return (await inTheWay(acting, span, exceptId)).find((one) => one.placeId === placeId) ?? null;
}

/** @throws DomainError 409 with by whom the place is taken, until when and for what */
export async function refuseTakenPlace(
  acting: Acting,
  placeId: string | null,
  span: SpanMs,
  exceptId: string | null = null,
): Promise<void> {
  const found = await takenPlace(acting, placeId, span, exceptId);
  if (found === null) return;
  const { manager, workshop, now } = acting;
  const place = (await placesById(manager, workshop.id)).get(placeId ?? '')?.name ?? '';
  const { who, what } = await named(acting, found);
  const over = found.toAt <= now;
  throw conflict(
    'place_taken',
    over
      ? `${place} is still taken by ${who}: ${what}.`
      : `${place} is taken until ${clockText(found.toAt, workshop.zone, now)} by ${who}: ${what}.`,
  );
}

/** @throws DomainError 409 with what the person has then */
export async function refuseElsewhere(acting: Acting, personId: string, span: SpanMs): Promise<void> {
  const found = (await inTheWay(acting, span, null)).find((one) => one.personId === personId);
  if (!found) return;
  const { workshop, now } = acting;
  const { who, what } = await named(acting, found);
  const clock = (at: number): string => clockText(at, workshop.zone, now);
  throw conflict(
    'elsewhere',
    found.state === 'begun'
      ? `${who} is at ${what}, until ${clock(Math.max(found.toAt, now))} as planned. End it first, or take a later time.`
      : `${who} has ${what} from ${clock(found.fromAt)} to ${clock(found.toAt)}. Take another time, or give that back.`,
  );
}

async function named({ manager, workshop }: Acting, stint: WorkStint): Promise<{ who: string; what: string }> {
  const work = await findWork(manager, workshop.id, stint.workId);
  return {
    who: (await personRefs(manager, workshop.id)).get(stint.personId)?.name ?? '',
    what: work ? workName(work) : '',
  };
}
