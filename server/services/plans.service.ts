import type { PlanDto, PlanRequest } from '@/shared/contract/plan';
import type { Deps, Member } from '../deps';
import { planFor } from './plan-inputs';

/** Every way to bring a spare to its target, with its band. Nothing is stored. */
export const plan = async (deps: Deps, member: Member, request: PlanRequest, now: number): Promise<PlanDto> =>
  (await planFor(deps.dataSource.manager, member.workshopId, request, now)).dto;
