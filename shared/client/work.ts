/** Other work: the list, and what is done with a piece; each write answers the piece as it stands then. */
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
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export type WorkFilter = Pick<WorkQuery, 'state' | 'repairId'>;

/** Work that is not over, or that is, page by page; the last list stays while the next one comes. */
export const workListQuery = (filter: WorkFilter = {}) =>
  infiniteQueryOptions({
    queryKey: [roots.work, 'list', filter.state ?? 'open', filter.repairId ?? null],
    queryFn: ({ pageParam, signal }) =>
      api.get<WorkListDto>('/work', {
        query: { ...filter, page: pageParam > 1 ? pageParam : undefined },
        signal,
      }),
    initialPageParam: 1,
    getNextPageParam: (last) => last.nextPage,
    staleTime: staleTimes.running,
    placeholderData: keepPreviousData,
  });
export const useWork = (filter: WorkFilter = {}) => useInfiniteQuery(workListQuery(filter));

export const workQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.work, 'one', id],
    queryFn: ({ signal }) => api.get<WorkDto>(`/work/${id}`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
export const useWorkItem = (id: string) => useQuery(workQuery(id));

/** Puts a piece of work into the cache unless a newer one is there: a socket's answer may overtake a write's. */
export function storeWork(client: QueryClient, work: WorkDto): void {
  const key = workQuery(work.id).queryKey;
  const known = client.getQueryData(key);
  if (!known || known.rev <= work.rev) client.setQueryData(key, work);
}

const useWorkWrite = <Input>(send: (input: Input, idempotencyKey: string) => Promise<WorkDto>) =>
  useWrite<Input, WorkDto>({ send, store: storeWork, changes: [roots.work, roots.benchPlan, roots.staffing] });

export const useAddWork = () =>
  useWorkWrite((input: WorkInput, idempotencyKey) => api.post<WorkDto>('/work', input, { idempotencyKey }));

export const useChangeWork = () =>
  useWorkWrite(({ id, rev, ...input }: WorkInput & { id: string; rev: number }) =>
    api.patch<WorkDto>(`/work/${id}`, input, { rev }),
  );

/** Takes it, or with a person's id gives it. 409 says what stands against it: a skill, a place, or the person's own work. */
export const useTakeWork = () =>
  useWorkWrite(({ id, ...input }: TakeWorkInput & { id: string }, idempotencyKey) =>
    api.post<WorkDto>(`/work/${id}/take`, input, { idempotencyKey }),
  );

export interface StintAct {
  id: string;
  stintId: string;
}

export const useBeginStint = () =>
  useWorkWrite(({ id, stintId }: StintAct, idempotencyKey) =>
    api.post<WorkDto>(`/work/${id}/stints/${stintId}/begin`, {}, { idempotencyKey }),
  );

/** Done, or with minutes left only a part of it: the rest is open again. */
export const useEndStint = () =>
  useWorkWrite(({ id, stintId, ...input }: EndStintInput & StintAct, idempotencyKey) =>
    api.post<WorkDto>(`/work/${id}/stints/${stintId}/done`, input, { idempotencyKey }),
  );

/** Taking it again undoes it. */
export const useGiveBack = () =>
  useWorkWrite(({ id, stintId }: StintAct, idempotencyKey) =>
    api.post<WorkDto>(`/work/${id}/stints/${stintId}/give-back`, {}, { idempotencyKey }),
  );

/** It is not to be done any more; 409 while somebody is at it. */
export const useDropWork = () =>
  useWorkWrite(({ id, reason }: { id: string; reason: string }) => api.post<WorkDto>(`/work/${id}/drop`, { reason }));

/** Brings back what was done or dropped. */
export const useReopenWork = () =>
  useWorkWrite(({ id }: { id: string }) => api.post<WorkDto>(`/work/${id}/reopen`, {}));
