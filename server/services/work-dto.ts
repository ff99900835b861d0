import type { EntityManager } from 'typeorm';
import type { StintDto, WorkDto, WorkState } from '@/shared/contract/work';
import type { PersonRef } from '@/shared/contract/common';
import type { WorkStint } from '../entities/work-stint';
import { chargeNames, type ChargeName } from '../repositories/charges.repository';
import { personRefs } from '../repositories/person-refs.repository';
import { placesById } from '../repositories/places.repository';
import { repairRefs } from '../repositories/repairs.repository';
import { skillsById } from '../repositories/skills.repository';
import { titleOf } from './charge-words';
import { toInstant, toOptionalInstant } from './instants';
import type { WorkFile } from './work-file';

type Named = Map<string, { id: string; name: string }>;
interface Names {
  people: Map<string, PersonRef>;
  skills: Named;
  places: Named;
  repairs: Map<string, { id: string; number: string }>;
  charges: Map<string, ChargeName>;
}

const given = (ids: readonly (string | null)[]): string[] => [...new Set(ids.filter((id) => id !== null))];

async function loadNames(manager: EntityManager, workshopId: string, files: readonly WorkFile[]): Promise<Names> {
  const repairIds = given(files.map(({ work }) => work.repairId));
  const chargeIds = given(files.flatMap(({ stints }) => stints.map(({ waitChargeId }) => waitChargeId)));
  return {
    people: await personRefs(manager, workshopId),
    skills: await skillsById(manager, workshopId),
    places: await placesById(manager, workshopId),
    repairs: await repairRefs(manager, workshopId, repairIds),
    charges: await chargeNames(manager, workshopId, chargeIds),
  };
}

/** Pieces of work as screens get them, in the order they are given. */
export async function workDtos(
  manager: EntityManager,
  workshopId: string,
  files: readonly WorkFile[],
): Promise<WorkDto[]> {
  const names = await loadNames(manager, workshopId, files);
  return files.map((file) => workDto(file, names));
}

export async function oneWorkDto(manager: EntityManager, workshopId: string, file: WorkFile): Promise<WorkDto> {
  const [dto] = await workDtos(manager, workshopId, [file]);
  return dto!;
}

export function workState({ work, stints }: WorkFile): WorkState {
  if (work.overAt !== null) return work.dropReason === null ? 'done' : 'dropped';
  if (stints.some(({ state }) => state === 'begun')) return 'begun';
  return work.leftLongMinutes > 0 ? 'open' : 'taken';
}

const refOf = ({ people }: Names, id: string): PersonRef => people.get(id) ?? { id, name: '' };
const nameOf = (named: Named, id: string | null) => {
  const found = named.get(id ?? '');
  return found ? { id: found.id, name: found.name } : null;
};

function workDto(file: WorkFile, names: Names): WorkDto {
  const { work } = file;
  return {
    id: work.id,
    number: work.number,
    title: work.title,
    likelyMinutes: work.likelyMinutes,
    longMinutes: work.longMinutes,
    skill: nameOf(names.skills, work.skillId),
    place: nameOf(names.places, work.placeId),
    repair: names.repairs.get(work.repairId ?? '') ?? null,
    priority: work.priority,
    dueAt: toOptionalInstant(work.dueAt),
    splittable: work.splittable,
    note: work.note,
    state: workState(file),
    leftMinutes: work.leftMinutes,
    leftLongMinutes: work.leftLongMinutes,
    stints: file.stints.map((stint) => stintDto(stint, names)),
    createdBy: refOf(names, work.createdById),
    createdAt: toInstant(work.createdAt),
    over:
      work.overAt === null
        ? null
        : {
            at: toInstant(work.overAt),
            by: refOf(names, work.overById ?? work.createdById),
            reason: work.dropReason,
          },
    rev: work.rev,
  };
}

function stintDto(stint: WorkStint, names: Names): StintDto {
  const charge = names.charges.get(stint.waitChargeId ?? '');
  return {
    id: stint.id,
    person: refOf(names, stint.personId),
    givenBy: stint.givenById === null ? null : refOf(names, stint.givenById),
    state: stint.state,
    from: toInstant(stint.fromAt),
    to: toInstant(stint.toAt),
    begunAt: toOptionalInstant(stint.begunAt),
    endedAt: toOptionalInstant(stint.endedAt),
    waitOf: charge ? { chargeId: charge.id, title: titleOf(charge) } : null,
  };
}
