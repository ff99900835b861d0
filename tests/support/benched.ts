/** Hours, skills, places and other work of a furnished workshop, made over the API. */
import type { PlaceDto, SkillDto } from '@/shared/contract/staffing';
import type { WorkDto } from '@/shared/contract/work';
import { created } from './stocked';
import type { TestAgent } from './server';

export interface Benched {
  skillId: string;
  /** Nothing names it. */
  unusedSkillId: string;
  placeId: string;
  unusedPlaceId: string;
  /** A part of it is the technician's, from now on. */
  workId: string;
  stintId: string;
  /** Given up; it can be brought back. */
  droppedWorkId: string;
  workRev: number;
}

export const workForm = (change: object = {}) => ({
  title: 'Brake bleed',
  likelyMinutes: '40',
  longMinutes: '60',
  skillId: null,
  placeId: null,
  priority: 'usual',
  dueAt: null,
  repairId: null,
  splittable: false,
  note: null,
  ...change,
});
export const staffingForm = (change: object = {}) => ({
  hours: null,
  breaks: [],
  daysOff: [],
  skillIds: [],
  ...change,
});

let keys = 0;
const newKey = (): string => `benching-key-${(keys += 1)}`;

async function answered<Dto>(test: ReturnType<TestAgent['post']>): Promise<Dto> {
  const answer = await test;
  if (!answer.ok) throw new Error(`${answer.status}: ${JSON.stringify(answer.body)}`);
  return answer.body as Dto;
}

/** Texts hold the workshop's name, so that a leak shows. */
export async function addBench(
  agents: { technician: TestAgent; manager: TestAgent },
  workshop: { name: string; personId: string; repairId: string },
): Promise<Benched> {
  const { technician, manager } = agents;
  const { name, personId, repairId } = workshop;
  const named = (what: string) => ({ name: `${name}’s ${what}` });
  const skill = await created<SkillDto>(manager, '/api/skills', named('brakes'));
  const unusedSkill = await created<SkillDto>(manager, '/api/skills', named('air conditioning'));
  const place = await created<PlaceDto>(manager, '/api/places', { ...named('bay'), kind: 'bay' });
  const unusedPlace = await created<PlaceDto>(manager, '/api/places', { ...named('bench'), kind: 'bench' });
  await answered(
    manager.patch(`/api/staffing/${personId}`, staffingForm({ skillIds: [skill.id] })).set('If-Match', '"0"'),
  );
  const add = (change: object) =>
    answered<WorkDto>(technician.post('/api/work', workForm(change)).set('Idempotency-Key', newKey()));
  const added = await add({
    title: `${name}’s work`,
    ...{ skillId: skill.id, placeId: place.id, repairId, splittable: true, note: `Of ${name}’s van` },
  });
  const taken = await answered<WorkDto>(
    technician.post(`/api/work/${added.id}/take`, { minutes: '30' }).set('Idempotency-Key', newKey()),
  );
  const dropped = await add({ title: `${name}’s other work` });
  await answered(technician.post(`/api/work/${dropped.id}/drop`, { reason: `${name}’s reason` }));
  return {
    ...{ skillId: skill.id, unusedSkillId: unusedSkill.id, placeId: place.id, unusedPlaceId: unusedPlace.id },
    ...{ workId: added.id, stintId: taken.stints[0]?.id ?? '', workRev: taken.rev, droppedWorkId: dropped.id },
  };
}
