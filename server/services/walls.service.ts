import type { WallDto, WallMeDto } from '@/shared/contract/wall';
import type { Deps, Member } from '../deps';
import { notFound } from '../errors/domain-error';
import { listPeople } from '../repositories/people.repository';
import { findWall, listWalls } from '../repositories/walls.repository';
import { findWorkshop } from '../repositories/workshops.repository';
import { wallDto, wallMeDto } from './walls-dto';

export async function pairedWalls(deps: Deps, member: Member): Promise<WallDto[]> {
  const { manager } = deps.dataSource;
  const [walls, people] = await Promise.all([
    listWalls(manager, member.workshopId),
    listPeople(manager, member.workshopId),
  ]);
  const names = new Map(people.map((person) => [person.id, person.name]));
  return walls.map((wall) => wallDto(wall, names.get(wall.approvedById) ?? ''));
}

/** What a wall knows of itself. */
export async function wallMe(deps: Deps, asking: { id: string; workshopId: string }): Promise<WallMeDto> {
  const { manager } = deps.dataSource;
  const wall = await findWall(manager, asking.workshopId, asking.id);
  const workshop = await findWorkshop(manager, asking.workshopId);
  if (!wall || !workshop) throw notFound('This wall');
  return wallMeDto(wall, workshop);
}
