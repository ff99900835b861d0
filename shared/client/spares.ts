import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import type {
  CapacityAnswerInput,
  NewSpareInput,
  QuarantineInput,
  SpareDto,
  SpareHistoryDto,
  SpareInput,
  SpareReadingInput,
  SpareWhere,
} from '@/shared/contract/spare';
import { api } from './api';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite, type WriteOptions } from './use-write';

export interface SpareFilter {
  /** Searched in label, type and shelf place. */
  q?: string;
  where?: SpareWhere | '';
  moduleTypeId?: string;
}

export const sparesQuery = (filter: SpareFilter = {}) =>
  queryOptions({
    queryKey: [roots.spares, { q: '', where: '', moduleTypeId: '', ...filter }],
    queryFn: ({ signal }) => api.get<SpareDto[]>('/spares', { query: { ...filter }, signal }),
    staleTime: staleTimes.stock,
    placeholderData: keepPreviousData,
  });
export const useSpares = (filter: SpareFilter = {}) => useQuery(sparesQuery(filter));

export const spareQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.spare, id],
    queryFn: ({ signal }) => api.get<SpareDto>(`/spares/${id}`, { signal }),
    staleTime: staleTimes.stock,
    enabled: id !== '',
  });
export const useSpare = (id: string) => useQuery(spareQuery(id));

export const useSpareHistory = (id: string) =>
  useQuery({
    queryKey: [roots.spare, id, 'history'],
    queryFn: ({ signal }) => api.get<SpareHistoryDto>(`/spares/${id}/history`, { signal }),
    staleTime: staleTimes.stock,
    enabled: id !== '',
  });

/** Every write of a spare answers the spare as it stands then. */
const spareWrite = <Input>(send: WriteOptions<Input, SpareDto>['send']): WriteOptions<Input, SpareDto> => ({
  send,
  store: (client, spare) => client.setQueryData(spareQuery(spare.id).queryKey, spare),
  changes: [roots.spares, roots.spare, roots.moduleTypes],
});

export const useAddSpare = () => useWrite(spareWrite((input: NewSpareInput) => api.post<SpareDto>('/spares', input)));

export const useChangeSpare = () =>
  useWrite(
    spareWrite(({ id, rev, ...input }: SpareInput & { id: string; rev: number }) =>
      api.patch<SpareDto>(`/spares/${id}`, input, { rev }),
    ),
  );

export const useAddSpareReading = () =>
  useWrite(
    spareWrite(({ id, ...input }: SpareReadingInput & { id: string }) =>
      api.post<SpareDto>(`/spares/${id}/readings`, input),
    ),
  );

/** Takes what a charge has found as the capacity (`capacities` with the state 'found'), or leaves it. */
export const useAnswerCapacity = () =>
  useWrite(
    spareWrite(
      ({ id, rev, capacityId, answer }: CapacityAnswerInput & { id: string; rev: number; capacityId: string }) =>
        api.post<SpareDto>(`/spares/${id}/capacities/${capacityId}`, { answer }, { rev }),
    ),
  );

/**
 * Sets a spare aside; a planned or queued charge that is named with it is taken off in the same act. 412 and 409 bring
 * the spare as it stands in `present`.
 */
export const useQuarantineSpare = () =>
  useWrite({
    ...spareWrite(({ id, rev, ...input }: QuarantineInput & { id: string; rev: number }) =>
      api.post<SpareDto>(`/spares/${id}/quarantine`, input, { rev }),
    ),
    changes: [
      ...[roots.spares, roots.spare, roots.moduleTypes],
      ...[roots.charges, roots.charge, roots.board, roots.alerts, roots.chargers],
    ],
  });

export const useReleaseSpare = () =>
  useWrite(
    spareWrite(({ id, rev }: { id: string; rev: number }) => api.post<SpareDto>(`/spares/${id}/release`, {}, { rev })),
  );
