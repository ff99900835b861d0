import { skipToken, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { ChannelsNeededInput, ReplayJobDto, ShelfInput, WhatIfInput } from '@/shared/contract/waits-replay';
import { api } from './api';
import { sentenceOf } from './api-problem';
import { roots } from './query-keys';
import { useWrite } from './use-write';

/** How often one that goes on is asked for, ms. */
const ASK_AGAIN_MS = 700;

interface Inputs {
  'what-if': WhatIfInput;
  shelf: ShelfInput;
  'channels-needed': ChannelsNeededInput;
}
const keyOf = (id: string | null) => [roots.waits, 'replay', id];
export const goesOn = (job: ReplayJobDto | undefined): boolean => job?.state === 'queued' || job?.state === 'running';

/** A calculation over the workshop's history: begun, asked for until it is over, and ended on demand. */
export function useReplay<Kind extends keyof Inputs>(kind: Kind) {
  const [id, setId] = useState<string | null>(null);
  const begin = useWrite({
    send: (input: Inputs[Kind], idempotencyKey) => api.post<ReplayJobDto>(`/waits/${kind}`, input, { idempotencyKey }),
    store: (client, job) => void client.setQueryData(keyOf(job.id), job),
  });
  const asked = useQuery({
    queryKey: keyOf(id),
    queryFn: id === null ? skipToken : ({ signal }) => api.get<ReplayJobDto>(`/waits/replays/${id}`, { signal }),
    refetchInterval: ({ state }) => (goesOn(state.data) ? ASK_AGAIN_MS : false),
    staleTime: Infinity,
  });
  const cancel = useWrite({
    send: (which: string, idempotencyKey) =>
      api.post<ReplayJobDto>(`/waits/replays/${which}/cancel`, {}, { idempotencyKey }),
    store: (client, job) => void client.setQueryData(keyOf(job.id), job),
  });
  const job = asked.data;
  const error = begin.error ?? cancel.error ?? asked.error;
  return {
    job,
    busy: begin.isPending || goesOn(job),
    problem: error ? sentenceOf(error) : (job?.problem ?? null),
    begin: (input: Inputs[Kind]) => {
      cancel.reset();
      begin.mutate(input, { onSuccess: (begun) => setId(begun.id) });
    },
    cancel: job && goesOn(job) ? () => cancel.mutate(job.id) : null,
  };
}
export type Replay<Kind extends keyof Inputs> = ReturnType<typeof useReplay<Kind>>;
