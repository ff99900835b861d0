/** Repairs: reads, and the writes, each of which answers the repair's whole page as it stands then. */
import {
  infiniteQueryOptions,
  keepPreviousData,
  queryOptions,
  useInfiniteQuery,
  useQuery,
} from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import type {
  DecideSourceInput,
  PackReadingInput,
  SecondSourceInput,
  TakeTargetInput,
} from '@/shared/contract/pack-reading';
import type { PhotoNoteInput } from '@/shared/contract/photo';
import { photoField } from '@/shared/contract/photo-upload';
import type {
  FitAsItIsInput,
  AdvisedInput,
  CandidateDto,
  ChangeRepairInput,
  CorrectWaitInput,
  RemovedModuleInput,
  RepairInput,
  RepairListDto,
  RepairPageDto,
  RepairsQuery,
} from '@/shared/contract/repair';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { saveFile } from './save-file';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export type RepairFilter = Pick<RepairsQuery, 'q' | 'state'>;

/** A list of repairs, page by page; the last list stays while the next one comes. */
export const repairsQuery = (filter: RepairFilter = {}) =>
  infiniteQueryOptions({
    queryKey: [roots.repairs, { q: filter.q ?? '', state: filter.state ?? 'open' }],
    queryFn: ({ pageParam, signal }) =>
      api.get<RepairListDto>('/repairs', {
        query: { q: filter.q, state: filter.state, page: pageParam > 1 ? pageParam : undefined },
        signal,
      }),
    initialPageParam: 1,
    getNextPageParam: (last) => last.nextPage,
    staleTime: staleTimes.running,
    placeholderData: keepPreviousData,
  });
export const useRepairs = (filter: RepairFilter = {}) => useInfiniteQuery(repairsQuery(filter));

/** How many open repairs need somebody, for the places of the shell; 0 until it is known. */
export const useNeedsSomebodyCount = (): number => useRepairs().data?.pages[0]?.counts.needsSomebody ?? 0;

export const repairQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.repair, id],
    queryFn: ({ signal }) => api.get<RepairPageDto>(`/repairs/${id}`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
export const useRepair = (id: string) => useQuery(repairQuery(id));

/** The spares of the pack's module type, by the likely time to the target. */
export const candidatesQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.repair, id, 'candidates'],
    queryFn: ({ signal }) => api.get<CandidateDto[]>(`/repairs/${id}/candidates`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
/** @param enabled asked for only where a target is known: without one nothing can be reckoned */
export const useCandidates = (id: string, enabled = true) =>
  useQuery({ ...candidatesQuery(id), enabled: enabled && id !== '' });

/** Puts a repair into the cache unless a newer one is there: a socket's answer may overtake a write's. */
export function storeRepair(client: QueryClient, repair: RepairPageDto): void {
  const key = repairQuery(repair.id).queryKey;
  const known = client.getQueryData(key);
  if (!known || known.rev <= repair.rev) client.setQueryData(key, repair);
}

const touched: Root[] = [roots.repairs, roots.repair];
const withSpares: Root[] = [...touched, roots.spares, roots.spare];
const withCharges: Root[] = [...withSpares, roots.charges, roots.charge, roots.board, roots.waits];

const useRepairWrite = <Input>(
  send: (input: Input, idempotencyKey: string) => Promise<RepairPageDto>,
  changes: Root[] = touched,
) => useWrite<Input, RepairPageDto>({ send, store: storeRepair, changes });

/** Which repair, and the revision it was seen at. */
export interface RepairAct {
  id: string;
  rev: number;
}

/** Books a repair; 409 with the field `number` where it is taken. */
export const useStartRepair = () =>
  useRepairWrite(
    (input: RepairInput, idempotencyKey) => api.post<RepairPageDto>('/repairs', input, { idempotencyKey }),
    [...touched, roots.charges, roots.charge, roots.board],
  );

export const useChangeRepair = () =>
  useRepairWrite(
    ({ id, rev, ...input }: ChangeRepairInput & RepairAct) =>
      api.patch<RepairPageDto>(`/repairs/${id}`, input, { rev }),
    withCharges,
  );

export const useAddPackReading = () =>
  useRepairWrite(({ id, ...input }: PackReadingInput & { id: string }, idempotencyKey) =>
    api.post<RepairPageDto>(`/repairs/${id}/readings`, input, { idempotencyKey }),
  );

export const useSetReadingAside = () =>
  useRepairWrite(({ id, readingId, reason }: { id: string; readingId: string; reason: string }) =>
    api.post<RepairPageDto>(`/repairs/${id}/readings/${readingId}/set-aside`, { reason }),
  );

export const useAddSecondSource = () =>
  useRepairWrite(({ id, ...input }: SecondSourceInput & { id: string }, idempotencyKey) =>
    api.post<RepairPageDto>(`/repairs/${id}/second-source`, input, { idempotencyKey }),
  );

export const useDecideSource = () =>
  useRepairWrite(({ id, sourceId, ...input }: DecideSourceInput & { id: string; sourceId: string }) =>
    api.post<RepairPageDto>(`/repairs/${id}/second-source/${sourceId}/decision`, input),
  );

export const useTakeTarget = () =>
  useRepairWrite(({ id, ...input }: TakeTargetInput & { id: string }) =>
    api.post<RepairPageDto>(`/repairs/${id}/target`, input),
  );

/** 409 says for which repair, or on which charge, the spare is. */
export const useReserveSpare = () =>
  useRepairWrite(
    ({ id, spareId }: { id: string; spareId: string }) => api.post<RepairPageDto>(`/repairs/${id}/spare`, { spareId }),
    withSpares,
  );

export const useFreeSpare = () =>
  useRepairWrite(({ id, rev }: RepairAct) => api.delete<RepairPageDto>(`/repairs/${id}/spare`, { rev }), withSpares);

/** 409 where it needs a charge, or has to be read once more first. */
export const useFitAsItIs = () =>
  useRepairWrite(
    ({ id, rev, note }: FitAsItIsInput & RepairAct) => api.post<RepairPageDto>(`/repairs/${id}/fit`, { note }, { rev }),
    withSpares,
  );

export const useRecordRemoved = () =>
  useRepairWrite(
    ({ id, ...input }: RemovedModuleInput & { id: string }) => api.post<RepairPageDto>(`/repairs/${id}/removed`, input),
    withSpares,
  );

export const useAddAdvised = () =>
  useRepairWrite(({ id, ...input }: AdvisedInput & { id: string }) =>
    api.post<RepairPageDto>(`/repairs/${id}/advised`, input),
  );

export const useChangeAdvised = () =>
  useRepairWrite(({ id, rev, itemId, ...input }: AdvisedInput & RepairAct & { itemId: string }) =>
    api.patch<RepairPageDto>(`/repairs/${id}/advised/${itemId}`, input, { rev }),
  );

export const useRemoveAdvised = () =>
  useRepairWrite(({ id, rev, itemId }: RepairAct & { itemId: string }) =>
    api.delete<RepairPageDto>(`/repairs/${id}/advised/${itemId}`, { rev }),
  );

/** Refused with what is missing, unless the note says why. */
export const useHandOverRepair = () =>
  useRepairWrite(
    ({ id, note }: { id: string; note: string | null }) =>
      api.post<RepairPageDto>(`/repairs/${id}/hand-over`, { note }),
    withCharges,
  );

export const useArchiveRepair = () =>
  useRepairWrite(({ id, archived }: { id: string; archived: boolean }) =>
    api.post<RepairPageDto>(`/repairs/${id}/archive`, { archived }),
  );

export const useDeleteRepair = () =>
  useRepairWrite(
    ({ id, reason }: { id: string; reason: string }) => api.post<RepairPageDto>(`/repairs/${id}/delete`, { reason }),
    withCharges,
  );

export const useRestoreRepair = () =>
  useRepairWrite(({ id }: { id: string }) => api.post<RepairPageDto>(`/repairs/${id}/restore`, {}), withCharges);

export const useCorrectWait = () =>
  useRepairWrite(
    ({ id, rev, waitId, ...input }: CorrectWaitInput & RepairAct & { waitId: string }) =>
      api.patch<RepairPageDto>(`/repairs/${id}/wait/${waitId}`, input, { rev }),
    [...touched, roots.waits],
  );

/** A chosen picture; `mark` tells two of them apart, which JSON cannot. */
export interface PhotoToSend {
  id: string;
  file: Blob;
  mark: string;
  onSent: (share: number) => void;
}

export const useAddPhoto = () =>
  useRepairWrite(({ id, file, onSent }: PhotoToSend, idempotencyKey) => {
    const form = new FormData();
    form.append(photoField, file, 'photo');
    return api.upload<RepairPageDto>(`/repairs/${id}/photos`, form, { idempotencyKey, onSent });
  });

/** What is seen may set a spare aside and take a waiting charge off. */
export const useNotePhoto = () =>
  useRepairWrite(
    ({ id, rev, ...input }: PhotoNoteInput & RepairAct) => api.patch<RepairPageDto>(`/photos/${id}`, input, { rev }),
    withCharges,
  );

export const useRemovePhoto = () =>
  useRepairWrite(({ id, rev }: RepairAct) => api.delete<RepairPageDto>(`/photos/${id}`, { rev }));

/** Where a photo's picture is. */
export const photoAddress = (id: string, part: 'picture' | 'thumbnail'): string =>
  `/api/photos/${id}${part === 'thumbnail' ? '/thumbnail' : ''}`;

/** Saves the repairs of a list as CSV on this device; without a state all but the deleted ones. */
export const useSaveRepairs = () =>
  useWrite<RepairFilter>({
    send: async (filter) => saveFile(await api.blob('/repairs.csv', { query: { ...filter } }), 'repairs.csv'),
  });

/** Saves everything that is kept of the customer of a repair as a file on this device. */
export const useSaveCustomerData = () =>
  useWrite<string>({
    send: async (id) => saveFile(await api.blob(`/repairs/${id}/customer.json`), 'customer-data.json'),
  });

export const useEraseCustomer = () =>
  useRepairWrite(
    ({ id, reason }: { id: string; reason: string }) =>
      api.post<RepairPageDto>(`/repairs/${id}/customer/erase`, { reason }),
    [...touched, roots.search],
  );
