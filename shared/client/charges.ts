import { queryOptions, useQuery, type QueryClient } from '@tanstack/react-query';
import type { ChargeCardDto, ChargeDto, ReadingInput } from '@/shared/contract/charge';
import type { Instant } from '@/shared/contract/common';
import { api } from './api';
import { started } from './notify-state';
import { roots, type Root } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

export const chargesQuery = (filter: { closed?: boolean; page?: number } = {}) =>
  queryOptions({
    queryKey: [roots.charges, { closed: false, page: 1, ...filter }],
    queryFn: ({ signal }) =>
      api.get<ChargeCardDto[]>('/charges', {
        query: filter.closed ? { closed: 1, page: filter.page ?? 1 } : { open: 1 },
        signal,
      }),
    staleTime: staleTimes.running,
  });
/** Open charges, or a page of the closed ones, latest first. */
export const useCharges = (filter: { closed?: boolean; page?: number } = {}) => useQuery(chargesQuery(filter));

export const chargeQuery = (id: string) =>
  queryOptions({
    queryKey: [roots.charge, id],
    queryFn: ({ signal }) => api.get<ChargeDto>(`/charges/${id}`, { signal }),
    staleTime: staleTimes.running,
    enabled: id !== '',
  });
export const useCharge = (id: string) => useQuery(chargeQuery(id));

/** Puts a charge that the server has just answered where its screens look, unless a later one is there already. */
export function storeCharge(client: QueryClient, charge: ChargeDto): void {
  const key = chargeQuery(charge.id).queryKey;
  const known = client.getQueryData(key);
  if (!known || known.rev <= charge.rev) client.setQueryData(key, charge);
}

const touched: Root[] = [roots.charges, roots.board, roots.alerts];
const withStock: Root[] = [...touched, roots.spares, roots.spare, roots.chargers];

/** What every act on a charge says: which, and the revision it was seen at. */
export interface ChargeAct {
  id: string;
  rev: number;
}

/** A write on a charge that needs the connection (readings, look-ins and checks wait: waiting/waiting.ts): POST /charges/:id/<act>, answered by the whole charge. */
const useChargeWrite = <Input extends { id: string; rev?: number }>(
  act: string,
  changes: Root[],
  after?: (charge: ChargeDto) => void,
) =>
  useWrite<Input, ChargeDto>({
    send: ({ id, rev, ...input }, idempotencyKey) =>
      api.post<ChargeDto>(`/charges/${id}/${act}`, input, { rev, idempotencyKey }),
    store: (client, charge) => {
      storeCharge(client, charge);
      after?.(charge);
    },
    changes,
  });

export const useQueueCharge = () => useChargeWrite<ChargeAct & { clipOnAt: Instant | null }>('queue', withStock);
export const useStartCharge = () =>
  useChargeWrite<ChargeAct & { at?: Instant }>('start', withStock, () => started.set(true));
export const useHoldCharge = () => useChargeWrite<ChargeAct & { reason: string; at?: Instant }>('hold', touched);
export const useResumeCharge = () => useChargeWrite<ChargeAct & { at?: Instant }>('resume', touched);
export const useStopCharge = () =>
  useChargeWrite<ChargeAct & { reason: string; at?: Instant; quarantine?: boolean }>('stop', withStock);
export const useCurrentOff = () => useChargeWrite<ChargeAct & { at?: Instant }>('current-off', touched);
export const useNextStep = () => useChargeWrite<ChargeAct>('next-step', withStock);
export const useHandOver = () => useChargeWrite<ChargeAct & { personId: string }>('hand-over', touched);
export const useFitCharge = () => useChargeWrite<ChargeAct & { note?: string | null }>('fit', withStock);
export const useShelveCharge = () =>
  useChargeWrite<ChargeAct & { shelfPlace: string | null; note?: string | null }>('shelve', withStock);

export const useCorrectReading = () =>
  useWrite({
    send: ({
      id,
      readingId,
      ...input
    }: Partial<ReadingInput> & { id: string; readingId: string; reason?: string | null }) =>
      api.patch<ChargeDto>(`/charges/${id}/readings/${readingId}`, input),
    store: storeCharge,
    changes: touched,
  });

/** Drops a charge that is only planned or queued. */
export const useDropCharge = () =>
  useWrite({
    send: ({ id, rev }: ChargeAct) => api.delete(`/charges/${id}`, { rev }),
    store: (client, _, { id }) => client.removeQueries({ queryKey: chargeQuery(id).queryKey }),
    changes: withStock,
  });
