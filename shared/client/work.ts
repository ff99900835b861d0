/** Other work: the list, one piece, and what is done with it. Every write answers the piece as it stands then. */
import {
  infiniteQueryOptions,
  keepPreviousData,
  queryOptions,
  useInfiniteQuery,
  useQuery,
  type QueryClient,
} from '@tanstack/react-query';
import type { EndStintInput, TakeWorkInput, WorkDto, WorkInput, WorkListDto, WorkQuery } from '@/shared/contract/work';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const worksQuery = (filter: Omit<WorkQuery, 'page'> = {}) =>
  infiniteQueryOptions({
    queryKey: [roots.work, 'list', filter],
    queryFn: ({ pageParam, signal }) =>
      api.get<WorkListDto>('/work', { query: { ...filter, page: pageParam > 1 ? pageParam : undefined }, signal }),
    initialPageParam: 1,
    getNextPageParam: (last) => last.nextPage,
    staleTime: staleTimes.running,
    placeholderData: keepPreviousData,
  });
export const useWorks = (filter: Omit<WorkQuery, 'page'> = {}) => useInfiniteQuery(worksQuery(filter));

export const workQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.work, 'one', id],
    queryFn: ({ signal }) => api.get<WorkDto>(`/work/${id}`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
export const useWork = (id: string) => useQuery(workQuery(id));

const touched: Root[] = [roots.work, roots.benchPlan, roots.waits];
const store = (client: QueryClient, work: WorkDto) => client.setQueryData(workQuery(work.id).queryKey, work);

export const useAddWork = () =>
  useWrite({
    send: (input: WorkInput, idempotencyKey) => api.post<WorkDto>('/work', input, { idempotencyKey }),
    store,
    changes: touched,
  });

export const useChangeWork = () =>
  useWrite({
    send: ({ id, rev, ...input }: WorkInput & { id: string; rev: number }) =>
      api.patch<WorkDto>(`/work/${id}`, input, { rev }),
    store,
    changes: touched,
  });

export const useTakeWork = () =>
  useWrite({
    send: ({ id, ...input }: TakeWorkInput & { id: string }, idempotencyKey) =>
      api.post<WorkDto>(`/work/${id}/take`, input, { idempotencyKey }),
    store,
    changes: touched,
  });

const useStintWrite = <Input extends { id: string; stintId: string }>(act: string) =>
  useWrite({
    send: ({ id, stintId, ...input }: Input, idempotencyKey) =>
      api.post<WorkDto>(`/work/${id}/stints/${stintId}/${act}`, input, { idempotencyKey }),
    store,
    changes: touched,
  });
export interface StintAct {
  id: string;
  stintId: string;
}
export const useBeginStint = () => useStintWrite<StintAct>('begin');
export const useEndStint = () => useStintWrite<StintAct & EndStintInput>('done');
export const useGiveBack = () => useStintWrite<StintAct>('give-back');

export const useDropWork = () =>
  useWrite({
    send: ({ id, reason }: { id: string; reason: string }, idempotencyKey) =>
      api.post<WorkDto>(`/work/${id}/drop`, { reason }, { idempotencyKey }),
    store,
    changes: touched,
  });
export const useReopenWork = () =>
  useWrite({
    send: ({ id }: { id: string }, idempotencyKey) => api.post<WorkDto>(`/work/${id}/reopen`, {}, { idempotencyKey }),
    store,
    changes: touched,
  });
