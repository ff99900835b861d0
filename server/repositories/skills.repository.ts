import { IsNull, type EntityManager } from 'typeorm';
import { Skill } from '../entities/skill';
import { Work } from '../entities/work';

/** Those on the list. */
export const listSkills = (manager: EntityManager, workshopId: string): Promise<Skill[]> =>
  manager.find(Skill, { where: { workshopId, retiredAt: IsNull() }, order: { name: 'ASC' } });

/** By id, those taken off the list too: work that is over keeps their names. */
export async function skillsById(manager: EntityManager, workshopId: string): Promise<Map<string, Skill>> {
  const rows = await manager.findBy(Skill, { workshopId });
  return new Map(rows.map((row) => [row.id, row]));
}

/** Of those on the list. */
export const findSkill = (manager: EntityManager, workshopId: string, id: string): Promise<Skill | null> =>
  manager.findOneBy(Skill, { workshopId, id, retiredAt: IsNull() });

/** Of those on the list. */
export const findSkillNamed = (manager: EntityManager, workshopId: string, name: string): Promise<Skill | null> =>
  manager.findOneBy(Skill, { workshopId, name, retiredAt: IsNull() });

export const saveSkill = (manager: EntityManager, skill: Skill): Promise<Skill> => manager.save(Skill, skill);

/** Deletes it, or where work that is over names it takes it off the list. */
export async function removeSkillRow(
  manager: EntityManager,
  workshopId: string,
  id: string,
  now: number,
): Promise<void> {
  if ((await manager.countBy(Work, { workshopId, skillId: id })) > 0)
    await manager.update(Skill, { workshopId, id }, { retiredAt: now });
  else await manager.delete(Skill, { workshopId, id });
}
