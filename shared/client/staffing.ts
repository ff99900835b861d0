/** Hours, breaks, days off and skills of people, the workshop's list of skills, and its places. */
import { queryOptions, useQuery, type QueryClient } from '@tanstack/react-query';
import type {
  PlaceDto,
  PlaceInput,
  SkillDto,
  SkillInput,
  StaffingDto,
  StaffingInput,
  StaffingListDto,
} from '@/shared/contract/staffing';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const staffingQuery = () =>
  queryOptions({
    queryKey: [roots.staffing],
    queryFn: ({ signal }) => api.get<StaffingListDto>('/staffing', { signal }),
    staleTime: staleTimes.setUp,
  });
export const useStaffing = () => useQuery(staffingQuery());

/** Names of places and skills stand in work, and who is there when decides what fits. */
const touched: Root[] = [roots.staffing, roots.work, roots.benchPlan];

/** Puts a row into the list before the list is asked for again. */
const storeIn =
  <Row>(
    list: (known: StaffingListDto) => Row[],
    same: (one: Row, other: Row) => boolean,
    name: keyof StaffingListDto,
  ) =>
  (client: QueryClient, row: Row): void => {
    client.setQueryData(staffingQuery().queryKey, (known) => {
      if (!known) return known;
      const rows = list(known);
      const place = rows.findIndex((one) => same(one, row));
      return { ...known, [name]: place < 0 ? [...rows, row] : rows.with(place, row) };
    });
  };
const storePerson = storeIn<StaffingDto>(
  ({ people }) => people,
  (one, other) => one.person.id === other.person.id,
  'people',
);
const storeSkill = storeIn<SkillDto>(
  ({ skills }) => skills,
  (one, other) => one.id === other.id,
  'skills',
);
const storePlace = storeIn<PlaceDto>(
  ({ places }) => places,
  (one, other) => one.id === other.id,
  'places',
);

/** Revision 0 where the person has hours of their own for the first time. */
export const useChangeStaffing = () =>
  useWrite({
    send: ({ personId, rev, ...input }: StaffingInput & { personId: string; rev: number }) =>
      api.patch<StaffingDto>(`/staffing/${personId}`, input, { rev }),
    store: storePerson,
    changes: touched,
  });

/** 409 with the field `name` where it is taken; as of all that follow. */
export const useAddSkill = () =>
  useWrite({
    send: (input: SkillInput) => api.post<SkillDto>('/skills', input),
    store: storeSkill,
    changes: touched,
  });
export const useChangeSkill = () =>
  useWrite({
    send: ({ id, rev, ...input }: SkillInput & { id: string; rev: number }) =>
      api.patch<SkillDto>(`/skills/${id}`, input, { rev }),
    store: storeSkill,
    changes: touched,
  });
/** 409 while work that is not over needs it. */
export const useRemoveSkill = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/skills/${id}`, { rev }),
    changes: touched,
  });

export const useAddPlace = () =>
  useWrite({
    send: (input: PlaceInput) => api.post<PlaceDto>('/places', input),
    store: storePlace,
    changes: touched,
  });
export const useChangePlace = () =>
  useWrite({
    send: ({ id, rev, ...input }: PlaceInput & { id: string; rev: number }) =>
      api.patch<PlaceDto>(`/places/${id}`, input, { rev }),
    store: storePlace,
    changes: touched,
  });
/** 409 while work that is not over is to be done there. */
export const useRemovePlace = () =>
  useWrite({
    send: ({ id, rev }: { id: string; rev: number }) => api.delete(`/places/${id}`, { rev }),
    changes: touched,
  });
