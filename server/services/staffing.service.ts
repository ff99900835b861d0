/** Who is there when and can do what: hours, breaks, days off and skills of people. */
import type { EntityManager } from 'typeorm';
import type { StaffingDto, StaffingInput, StaffingListDto } from '@/shared/contract/staffing';
import type { Deps, Member } from '../deps';
import type { Person } from '../entities/person';
import { Staffing } from '../entities/staffing';
import type { Workshop } from '../entities/workshop';
import { invalid, notFound, stale } from '../errors/domain-error';
import { findPerson, listPeople } from '../repositories/people.repository';
import { listSkills } from '../repositories/skills.repository';
import { findStaffing, saveStaffing, staffingByPerson } from '../repositories/staffing.repository';
import { workshopForPlans } from '../repositories/workshop-for-plans.repository';
import { announceBench } from './announce';
import { newId } from './ids';
import { placeDtos } from './places.service';
import { skillDtos } from './skills.service';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';

/** Everybody who may sign in, the workshop's skills and its places. */
export async function staffing(deps: Deps, member: Member): Promise<StaffingListDto> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const workshop = await workshopForPlans(manager, workshopId);
  const rows = await staffingByPerson(manager, workshopId);
  const people = (await listPeople(manager, workshopId)).filter(({ disabledAt }) => disabledAt === null);
  return {
    people: people.map((person) => staffingDto(workshop, person, rows.get(person.id) ?? null)),
    skills: await skillDtos(manager, workshopId),
    places: await placeDtos(manager, workshopId),
  };
}

/** Who has no row of their own has revision 0. */
const staffingDto = (workshop: Workshop, person: Pick<Person, 'id' | 'name'>, row: Staffing | null): StaffingDto => ({
  person: { id: person.id, name: person.name },
  hours: row?.hours ?? null,
  hoursNow: row?.hours ?? workshop.workingHours,
  breaks: row?.breaks ?? [],
  daysOff: row?.daysOff ?? [],
  skillIds: row?.skillIds ?? [],
  rev: row?.rev ?? 0,
});

/**
 * Changes hours, breaks, days off and skills of a person.
 * @throws DomainError 404 unknown or switched off, 412 stale, 400 with the skill that is not on the list
 */
export async function changeStaffing(
  deps: Deps,
  member: Member,
  personId: string,
  rev: number,
  input: StaffingInput,
  now: number,
): Promise<StaffingDto> {
  const { workshopId } = member;
  const work = inTransaction(deps, async (manager) => {
    const person = await findPerson(manager, workshopId, personId);
    if (!person || person.disabledAt !== null) throw notFound('This person');
    const workshop = await workshopForPlans(manager, workshopId);
    const known = await findStaffing(manager, workshopId, personId);
    if ((known?.rev ?? 0) !== rev) throw stale(staffingDto(workshop, person, known));
    await refuseUnknownSkills(manager, workshopId, input.skillIds);
    const row = Object.assign(known ?? new Staffing(), input, {
      id: known?.id ?? newId(),
      workshopId,
      personId,
      skillIds: [...new Set(input.skillIds)],
      rev: rev + 1,
    });
    return staffingDto(workshop, person, await saveStaffing(manager, row));
  });
  const dto = await refusingTaken(work);
  announceBench(deps, workshopId, now);
  return dto;
}

async function refuseUnknownSkills(
  manager: EntityManager,
  workshopId: string,
  skillIds: readonly string[],
): Promise<void> {
  const known = new Set((await listSkills(manager, workshopId)).map(({ id }) => id));
  const unknown = skillIds.findIndex((id) => !known.has(id));
  if (unknown >= 0) throw invalid({ [`skillIds.${unknown}`]: 'This skill is not on the list. Choose another.' });
}
