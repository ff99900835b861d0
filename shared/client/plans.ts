import { queryOptions, useQueries, useQuery } from '@tanstack/react-query';
import type { ChargeDto } from '@/shared/contract/charge';
import type { KeepPlanRequest, PlanDto, PlanRequest } from '@/shared/contract/plan';
import { api } from './api';
import { storeCharge } from './charges';
import { roots } from './query-keys';
import { useWrite } from './use-write';

/** What may be typed into a plan; the server reads numbers as people type them. */
export type PlanInputs = { [Field in keyof PlanRequest]: PlanRequest[Field] | string };

const planQuery = (request: PlanInputs | null) =>
  queryOptions({
    queryKey: ['plan', request],
    queryFn: ({ signal }) => api.post<PlanDto>('/plans', request, { signal }),
    enabled: request !== null,
    staleTime: 60_000,
    gcTime: 5 * 60_000,
  });

/**
 * A plan for these inputs; null waits. Nothing is stored. The same inputs are not asked for again within a minute, and
 * the last plan stays on screen while the next is reckoned (`isPlaceholderData`).
 */
export const usePlan = (request: PlanInputs | null) =>
  useQuery({ ...planQuery(request), placeholderData: (last) => last });

/** Plans side by side, one for each of these inputs: what other spares would take. */
export const usePlans = (requests: readonly PlanInputs[]) => useQueries({ queries: requests.map(planQuery) });

/** Keeps an option of the plan as a charge. 409: the channel or the spare is taken; `present` says by what. */
export const useKeepPlan = () =>
  useWrite({
    send: (input: KeepPlanRequest, idempotencyKey) => api.post<ChargeDto>('/charges', input, { idempotencyKey }),
    store: storeCharge,
    changes: [roots.charges, roots.board, roots.spares, roots.spare, roots.chargers],
  });
