/** Who is there when, what they can do, and where: hours of people, the workshop's skills and places. */
import { queryOptions, useQuery } from '@tanstack/react-query';
import type {
  PlaceDto,
  PlaceInput,
  SkillDto,
  SkillInput,
  StaffingDto,
  StaffingInput,
} from '@/shared/contract/staffing';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export interface StaffingListDto {
  people: StaffingDto[];
  skills: SkillDto[];
  places: PlaceDto[];
}

export const staffingQuery = () =>
  queryOptions({
    queryKey: [roots.staffing],
    queryFn: ({ signal }) => api.get<StaffingListDto>('/staffing', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useStaffing = () => useQuery(staffingQuery());

const touched: Root[] = [roots.staffing, roots.benchPlan, roots.work];

export const useChangeStaffing = () =>
  useWrite({
    send: ({ personId, rev, ...input }: StaffingInput & { personId: string; rev: number }) =>
      api.patch<StaffingDto>(`/staffing/${personId}`, input, { rev }),
    changes: touched,
  });

export const useSaveSkill = () =>
  useWrite({
    send: ({ id, rev, ...input }: SkillInput & { id?: string; rev?: number }) =>
      id ? api.patch<SkillDto>(`/skills/${id}`, input, { rev }) : api.post<SkillDto>('/skills', input),
    changes: touched,
  });
export const useRemoveSkill = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/skills/${id}`, { rev }),
    changes: touched,
  });

export const useSavePlace = () =>
  useWrite({
    send: ({ id, rev, ...input }: PlaceInput & { id?: string; rev?: number }) =>
      id ? api.patch<PlaceDto>(`/places/${id}`, input, { rev }) : api.post<PlaceDto>('/places', input),
    changes: touched,
  });
export const useRemovePlace = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/places/${id}`, { rev }),
    changes: touched,
  });
