import { useQuery } from '@tanstack/react-query';
import type { MailboxDto } from '@/shared/contract/mailbox';
import { api } from './api';
import { isProblem } from './api-problem';
import { roots } from './query-keys';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** What is sent comes without a word of the socket: looked for this often, ms. */
const lookEveryMs = 5000;
const key = [roots.alerts, 'mailbox'];

/** The answer of a server that has no such place: it is no demo. */
export const isMissing = (error: unknown): boolean => isProblem(error) && error.status === 404;

/** What the server of the demo has sent. A real workshop has none: the question is answered by 404 there. */
export const useMailbox = () =>
  useQuery({
    queryKey: key,
    queryFn: ({ signal }) => api.get<MailboxDto>('/demo/mailbox', { signal }),
    staleTime: staleTimes.running,
    refetchInterval: ({ state }) => (isMissing(state.error) ? false : lookEveryMs),
  });

/** A phone of the demo for who asks. */
export const useDemoPhone = () =>
  useWrite({
    send: () => api.post<MailboxDto>('/demo/phone', {}),
    store: (client, mailbox) => client.setQueryData(key, mailbox),
    changes: [roots.alertSettings],
  });
