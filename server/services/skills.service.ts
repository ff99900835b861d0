import type { EntityManager } from 'typeorm';
import type { SkillDto, SkillInput } from '@/shared/contract/staffing';
import type { Deps, Member } from '../deps';
import { Skill } from '../entities/skill';
import { conflict, notFound, stale } from '../errors/domain-error';
import { listPeople } from '../repositories/people.repository';
import { findSkill, findSkillNamed, listSkills, removeSkillRow, saveSkill } from '../repositories/skills.repository';
import { saveStaffing, staffingByPerson } from '../repositories/staffing.repository';
import { listOpenWork, listOpenWorkOf } from '../repositories/work.repository';
import { announceBench } from './announce';
import { newId } from './ids';
import { nameTaken } from './name-taken';
import { inTransaction } from './unit-of-work';
import { inUseText } from './work-words';

/** The workshop's list, by name. People are those who may sign in. */
export async function skillDtos(manager: EntityManager, workshopId: string): Promise<SkillDto[]> {
  const skills = await listSkills(manager, workshopId);
  const staffing = await staffingByPerson(manager, workshopId);
  const able = (await listPeople(manager, workshopId)).filter(({ disabledAt }) => disabledAt === null);
  const held = able.flatMap(({ id }) => staffing.get(id)?.skillIds ?? []);
  const needed = new Set((await listOpenWork(manager, workshopId)).map(({ skillId }) => skillId));
  return skills.map(({ id, name, rev }) => ({
    id,
    name,
    people: held.filter((one) => one === id).length,
    inUse: needed.has(id),
    rev,
  }));
}

async function skillDto(manager: EntityManager, workshopId: string, id: string): Promise<SkillDto> {
  const found = (await skillDtos(manager, workshopId)).find((one) => one.id === id);
  if (!found) throw notFound('This skill');
  return found;
}

/** @throws DomainError 409 name taken */
export async function addSkill(deps: Deps, member: Member, input: SkillInput, now: number): Promise<SkillDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    await refuseTakenName(manager, workshopId, input.name, null);
    const row = Object.assign(new Skill(), { id: newId(), workshopId, name: input.name, retiredAt: null, rev: 1 });
    await saveSkill(manager, row);
    return skillDto(manager, workshopId, row.id);
  });
  announceBench(deps, workshopId, now);
  return dto;
}

/** @throws DomainError 412 stale, 409 name taken */
export async function changeSkill(
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: SkillInput,
  now: number,
): Promise<SkillDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const skill = await known(manager, workshopId, id, rev);
    await refuseTakenName(manager, workshopId, input.name, id);
    await saveSkill(manager, Object.assign(skill, { name: input.name, rev: rev + 1 }));
    return skillDto(manager, workshopId, id);
  });
  announceBench(deps, workshopId, now);
  return dto;
}

/** Takes it off the list, and from everybody who has it. @throws DomainError 412 stale, 409 while open work needs it */
export async function removeSkill(deps: Deps, member: Member, id: string, rev: number, now: number): Promise<void> {
  const { workshopId } = member;
  await inTransaction(deps, async (manager) => {
    const skill = await known(manager, workshopId, id, rev);
    const needing = await listOpenWorkOf(manager, workshopId, { skillId: id });
    if (needing.length > 0) throw conflict('skill_in_use', inUseText(needing, skill.name));
    for (const row of (await staffingByPerson(manager, workshopId)).values())
      if (row.skillIds.includes(id))
        await saveStaffing(
          manager,
          Object.assign(row, { skillIds: row.skillIds.filter((one) => one !== id), rev: row.rev + 1 }),
        );
    await removeSkillRow(manager, workshopId, id, now);
  });
  announceBench(deps, workshopId, now);
}

async function known(manager: EntityManager, workshopId: string, id: string, rev: number): Promise<Skill> {
  const skill = await findSkill(manager, workshopId, id);
  if (!skill) throw notFound('This skill');
  if (skill.rev !== rev) throw stale(await skillDto(manager, workshopId, id));
  return skill;
}

async function refuseTakenName(
  manager: EntityManager,
  workshopId: string,
  name: string,
  ownId: string | null,
): Promise<void> {
  const other = await findSkillNamed(manager, workshopId, name);
  if (other && other.id !== ownId)
    throw nameTaken('name', `There is a skill called ${name} already. Choose another name.`);
}
