import { vi } from 'vitest';
import { queryClient } from '@/shared/client/query-client';
import { sessionQuery } from '@/shared/client/session';
import { roleCapabilities, type Role } from '@/shared/contract/roles';
import type { SessionDto } from '@/shared/contract/session';

export interface Sent {
  method: string;
  path: string;
  body: unknown;
  rev: string | null;
}

/** The API of a signed-in person, as a settings form meets it: answers by `METHOD /path`, and what was sent. */
export function fakeServer(role: Role) {
  const sent: Sent[] = [];
  const person = { id: 'p1', name: 'Petra Aldwin', email: 'petra@example.com', role };
  const session: SessionDto = {
    person,
    workshop: { id: 'w1', name: 'Harbour Lane Traction', zone: 'UTC' },
    capabilities: [...roleCapabilities[role]],
    expiresAt: '2036-07-09T00:00:00.000Z',
  };
  // The shell shows these screens only to somebody signed in.
  queryClient.setQueryData(sessionQuery().queryKey, session);
  const answers: Record<string, (body: unknown) => Response> = {
    'GET /api/session': () => Response.json(session),
    'GET /api/people': () =>
      Response.json([
        { ...person, disabled: false, lastSeenAt: null, rev: 1 },
        {
          id: 'p2',
          name: 'Hella Brandt',
          email: 'hella@example.com',
          role: 'manager',
          disabled: false,
          lastSeenAt: null,
          rev: 1,
        },
      ]),
  };
  // The page of a repair asks for its other work: an unanswered question counts as no connection.
  for (const state of ['open', 'over'])
    answers[`GET /api/work?state=${state}&repairId=r1`] = () =>
      Response.json({ work: [], counts: { open: 0, taken: 0, begun: 0, over: 0 }, nextPage: null });
  vi.stubGlobal('fetch', async (path: string, init: RequestInit = {}) => {
    const method = init.method ?? 'GET';
    const body: unknown = init.body ? JSON.parse(init.body as string) : undefined;
    sent.push({ method, path, body, rev: new Headers(init.headers).get('if-match') });
    const answer = answers[`${method} ${path}`];
    if (!answer) throw new TypeError('Failed to fetch');
    return answer(body);
  });
  return { sent, answers, writes: () => sent.filter(({ method }) => method !== 'GET') };
}

export const problem = (status: number, detail: string, more: object = {}) =>
  Response.json({ type: 'about:blank', title: detail, status, detail, code: 'refused', ...more }, { status });
