/** People and other work under the bench plan. */
import type { EntityManager } from 'typeorm';
import type { Place } from '../../entities/place';
import type { Work } from '../../entities/work';
import type { WorkStint } from '../../entities/work-stint';
import { placesById } from '../../repositories/places.repository';
import { skillsById } from '../../repositories/skills.repository';
import { staffingByPerson } from '../../repositories/staffing.repository';
import { listOpenWork, listStints, workById } from '../../repositories/work.repository';
import type { Bench } from '../charge-file';
import { breaksIn, daysOffIn, presentSpans } from '../presence';
import type { Stretch } from './spans';

export interface GroundPerson {
  id: string;
  name: string;
  skillIds: string[];
  skills: string[];
  /** Working hours without breaks, from the first day to the horizon. */
  present: Stretch[];
  breaks: Stretch[];
  daysOff: { day: string; note: string | null }[];
}

export async function groundPeople(
  manager: EntityManager,
  { workshop, people }: Bench,
  window: Stretch,
): Promise<{ people: GroundPerson[]; stints: WorkStint[]; work: Map<string, Work>; places: Map<string, Place> }> {
  const workshopId = workshop.id;
  const staffing = await staffingByPerson(manager, workshopId);
  const skills = await skillsById(manager, workshopId);
  const stints = await listStints(manager, workshopId, window.from, window.to);
  const open = await listOpenWork(manager, workshopId);
  const named = await workById(manager, workshopId, [...new Set(stints.map(({ workId }) => workId))]);
  const here = [...people.values()].filter(({ disabledAt }) => disabledAt === null);
  return {
    people: here
      .map(({ id, name }): GroundPerson => {
        const own = staffing.get(id) ?? null;
        const skillIds = own?.skillIds ?? [];
        return {
          ...{ id, name, skillIds },
          skills: skillIds.flatMap((skillId) => skills.get(skillId)?.name ?? []),
          present: presentSpans(workshop, own, window.from, window.to),
          breaks: breaksIn(workshop, own, window.from, window.to),
          daysOff: daysOffIn(workshop, own, window.from, window.to),
        };
      })
      .sort((a, b) => a.name.localeCompare(b.name, 'en')),
    stints,
    work: new Map([...named, ...open.map((one): [string, Work] => [one.id, one])]),
    places: await placesById(manager, workshopId),
  };
}
