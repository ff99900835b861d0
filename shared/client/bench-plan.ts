/** The bench plan: the day of channels and people, the better plan there may be, moves by hand, and what fits the waits. */
import { queryOptions, useQuery } from '@tanstack/react-query';
import type {
  BenchChangeDto,
  BenchPlanDto,
  FitsDto,
  MoveChargeInput,
  MovePlacesDto,
  MyDayDto,
  ProposalDto,
  StartNowDto,
} from '@/shared/contract/bench-plan';
import { api } from './api';
import { roots, type Root } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** @param day 'YYYY-MM-DD'; null: today */
export const benchPlanQuery = (day: string | null = null, days: 1 | 7 = 1) =>
  queryOptions({
    queryKey: [roots.benchPlan, 'days', { day, days }],
    queryFn: ({ signal }) => api.get<BenchPlanDto>('/bench-plan', { query: { day, days }, signal }),
    staleTime: staleTimes.running,
    placeholderData: (last) => last,
  });
/** Channels and people of one day or seven. */
export const useBenchPlan = (day: string | null = null, days: 1 | 7 = 1) => useQuery(benchPlanQuery(day, days));

export const proposalQuery = () =>
  queryOptions({
    queryKey: [roots.benchPlan, 'proposal'],
    // 204 where nothing is better.
    queryFn: async ({ signal }) => (await api.get<ProposalDto | undefined>('/bench-plan/proposal', { signal })) ?? null,
    staleTime: staleTimes.running,
  });
/** A better plan than the present one; null: there is none. */
export const useProposal = () => useQuery(proposalQuery());

/** Where one charge could go; '' waits. */
export const movePlacesQuery = (chargeId: string) =>
  queryOptions({
    queryKey: [roots.benchPlan, 'places', chargeId],
    queryFn: ({ signal }) => api.get<MovePlacesDto>('/bench-plan/places', { query: { chargeId }, signal }),
    staleTime: staleTimes.running,
    enabled: chargeId !== '',
  });
export const useMovePlaces = (chargeId: string) => useQuery(movePlacesQuery(chargeId));

export const fitsQuery = () =>
  queryOptions({
    queryKey: [roots.benchPlan, 'fits'],
    queryFn: ({ signal }) => api.get<FitsDto>('/bench-plan/fits', { signal }),
    staleTime: staleTimes.running,
  });
/** A running stretch grows shorter with the clock, and what fits it with it. */
const fitsRenewMs = 60_000;

/** The work that fits the waits: of everybody for those who plan the bench, of oneself for others. */
export const useFits = (enabled = true) => useQuery({ ...fitsQuery(), enabled, refetchInterval: fitsRenewMs });

export const myDayQuery = (day: string | null = null) =>
  queryOptions({
    queryKey: [roots.benchPlan, 'my-day', day],
    queryFn: ({ signal }) => api.get<MyDayDto>('/bench-plan/my-day', { query: { day }, signal }),
    staleTime: staleTimes.running,
  });
export const useMyDay = (day: string | null = null) => useQuery(myDayQuery(day));

export const startNowQuery = () =>
  queryOptions({
    queryKey: [roots.benchPlan, 'start-now'],
    queryFn: ({ signal }) => api.get<StartNowDto[]>('/bench-plan/start-now', { signal }),
    staleTime: staleTimes.running,
  });
/** Booked repairs for which a spare can be brought close now. */
export const useStartNow = () => useQuery(startNowQuery());

const touched: Root[] = [roots.benchPlan, roots.charges, roots.charge, roots.board, roots.chargers];

/** Takes the proposal. 412: something has changed since; `present` is the proposal that holds now, or null. */
export const useAcceptProposal = () =>
  useWrite({
    send: (proposalId: string, idempotencyKey) =>
      api.post<BenchChangeDto>('/bench-plan/accept', { proposalId }, { idempotencyKey }),
    changes: touched,
  });

/** Moves one charge. 409: the channel is taken, and by what; 412: somebody has changed the charge since. */
export const useMoveCharge = () =>
  useWrite({
    send: (input: MoveChargeInput, idempotencyKey) =>
      api.post<BenchChangeDto>('/bench-plan/move', input, { idempotencyKey }),
    changes: touched,
  });

/** Takes a move or an accepted proposal back. 409: something has been touched since, and what. */
export const useUndoBenchChange = () =>
  useWrite({
    send: (changeId: string, idempotencyKey) =>
      api.post<BenchChangeDto>(`/bench-plan/undo/${changeId}`, {}, { idempotencyKey }),
    changes: touched,
  });

/** Of the PDF of a day: everybody's for those who plan the bench, one's own for others. */
export const daySheetPath = '/bench-plan/day-sheet.pdf';
