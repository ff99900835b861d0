import { queryOptions, useQuery, type QueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Capability, Role } from '@/shared/contract/roles';
import type {
  ActiveSessionDto,
  ChangeMeInput,
  CreateWorkshopInput,
  LinkDto,
  SessionDto,
  SignInInput,
} from '@/shared/contract/session';
import { api, orNull } from './api';
import { isOffline, isProblem } from './api-problem';
import { forgetDrafts } from './draft-store';
import { queryClient } from './query-client';
import { roots } from './query-keys';
import {
  endedStore,
  rememberSignedIn,
  returnTo,
  signedInBefore,
  signedInKey,
  signedInPerson,
  type EndedReason,
} from './session-state';
import { staleTimes } from './stale-times';
import { useWrite } from './use-write';

/** Who is signed in; null: nobody. A browser that never signed in is not asked about, so no call fails for nothing. */
export const sessionQuery = () =>
  queryOptions({
    queryKey: [roots.session],
    queryFn: async ({ signal }) => {
      if (!signedInBefore()) return null;
      const session = await present(signal);
      if (!session) {
        rememberSignedIn(null);
        forgetKept();
      } else if (signedInPerson() !== session.person.id) rememberSignedIn(session.person.id);
      // Somebody else signed in in another tab of this browser: its cookies are this tab's too.
      const last = queryClient.getQueryData<SessionDto | null>([roots.session]);
      if (last && session && last.person.id !== session.person.id) forgetOthers(queryClient);
      return session;
    },
    // Known without asking: the first screen of a visitor waits for nothing.
    initialData: (): SessionDto | null | undefined => (signedInBefore() ? undefined : null),
    staleTime: staleTimes.session,
    gcTime: Infinity,
  });

/** The session by the server; where it is not reached when the page opens, as it was kept on this device. */
async function present(signal: AbortSignal): Promise<SessionDto | null> {
  try {
    return await orNull(api.get<SessionDto>('/session', { signal }), [401]);
  } catch (error) {
    const away = isOffline(error) || (isProblem(error) && error.status >= 500);
    if (!away || queryClient.getQueryData([roots.session]) !== undefined) throw error;
    const kept = await openKept();
    if (kept === null) throw error;
    return kept;
  }
}

// Late: nothing of it is needed where the server answers.
const keeper = () => import('./kept/keeper');
const openKept = (): Promise<SessionDto | null> =>
  keeper().then(
    ({ openWithout }) => openWithout(queryClient),
    () => null,
  );
/** What this device keeps for reading without a connection goes. */
const forgetKept = (): void =>
  void keeper().then(
    (part) => part.forgetKept(),
    () => undefined,
  );

/** Keeps what is answered, so that the app can be read without a connection. Once, around the screens of a person. */
export function useKeptAnswers(): void {
  const personId = useSession().data?.person.id ?? null;
  useEffect(() => {
    if (personId === null) return;
    let stop: (() => void) | null = null;
    let gone = false;
    void keeper().then(
      ({ startKeeping }) => {
        if (!gone) stop = startKeeping(queryClient, personId);
      },
      () => undefined,
    );
    return () => {
      gone = true;
      stop?.();
    };
  }, [personId]);
}

export const useSession = () => useQuery(sessionQuery());

/**
 * The session where one is sure to be there: inside the guarded screens. Throws elsewhere.
 * Between the end of a session and the closing of the guard a screen may be drawn once more: it keeps its person.
 */
export function useMember(): SessionDto {
  const { data } = useSession();
  const [kept, setKept] = useState(data);
  if (data && data !== kept) setKept(data);
  const member = data ?? kept;
  if (!member) throw new Error('useMember outside the guarded screens');
  return member;
}

/** Whether the person signed in may. The server checks again. */
export function useCan(capability: Capability): boolean {
  return useSession().data?.capabilities.includes(capability) ?? false;
}

/** Drops everything asked for but who is signed in and what the installation is. */
function forgetOthers(client: QueryClient): void {
  client.removeQueries({
    predicate: ({ queryKey }) => queryKey[0] !== roots.session && queryKey[0] !== roots.frontDoor,
  });
  forgetKept();
}

function begin(client: QueryClient, session: SessionDto): void {
  const last = client.getQueryData(sessionQuery().queryKey);
  rememberSignedIn(session.person.id);
  endedStore.set(null);
  // Another person, or another workshop: nothing of the last one is shown for a moment.
  if (last?.person.id !== session.person.id || last.workshop.id !== session.workshop.id) forgetOthers(client);
  client.setQueryData(sessionQuery().queryKey, session);
}

export const useSignIn = () =>
  useWrite({
    send: (input: SignInInput) => api.post<SessionDto>('/session', input, { open: true }),
    store: begin,
  });

export const useDemoSignIn = () =>
  useWrite({
    send: (role: Role) => api.post<SessionDto>('/demo/sign-in', { role }, { open: true }),
    store: begin,
  });

export const useCreateWorkshop = () =>
  useWrite({
    send: (input: CreateWorkshopInput) => api.post<SessionDto>('/workshops', input, { open: true }),
    store: begin,
  });

/** What a one-use link is for. 404 and 410 say that it was used, has lapsed, or was never one. */
export const useLink = (token: string) =>
  useQuery({
    queryKey: [roots.link, token],
    queryFn: ({ signal }) => api.get<LinkDto>(`/links/${encodeURIComponent(token)}`, { open: true, signal }),
    enabled: token !== '',
    retry: (failures, error) => !isProblem(error) && failures < 2,
  });

export const useJoin = () =>
  useWrite({
    send: (input: { token: string; name: string; password: string }) =>
      api.post<SessionDto>('/join', input, { open: true }),
    store: begin,
  });

export const useResetPassword = () =>
  useWrite({
    send: (input: { token: string; password: string }) => api.post<SessionDto>('/reset', input, { open: true }),
    store: begin,
  });

/** Forgets what this browser holds of the person; the shell goes to the sign-in screen. */
function end(client: QueryClient): void {
  const person = client.getQueryData(sessionQuery().queryKey)?.person;
  if (person) forgetDrafts(person.id);
  rememberSignedIn(null);
  endedStore.set(null);
  client.setQueryData(sessionQuery().queryKey, null);
  forgetOthers(client);
}

export const useSignOut = () =>
  useWrite({ send: () => orNull(api.delete('/session'), [401]), store: (client) => end(client) });

/** Ends every session of the person, on all devices. */
export const useSignOutEverywhere = () =>
  useWrite({ send: () => orNull(api.delete('/sessions'), [401]), store: (client) => end(client) });

/** Where the person is signed in. */
export const useSessions = (enabled = true) =>
  useQuery({
    enabled,
    queryKey: [roots.sessions],
    queryFn: ({ signal }) => api.get<ActiveSessionDto[]>('/sessions', { signal }),
    staleTime: staleTimes.running,
  });

export const useChangeMe = () =>
  useWrite({
    send: (input: ChangeMeInput) => api.patch<SessionDto>('/me', input),
    changes: [roots.session, roots.people, roots.sessions],
  });

/** The session has ended without anybody's doing here: nothing typed is lost, the shell asks to sign in again. */
export function sessionLost(reason: EndedReason): void {
  if (!queryClient.getQueryData(sessionQuery().queryKey)) return;
  returnTo.keep(location.pathname + location.search);
  rememberSignedIn(null);
  forgetKept();
  endedStore.set(reason);
  queryClient.setQueryData(sessionQuery().queryKey, null);
}

/** Signing in or out in another tab is followed here at once. Once, around all screens. */
export function useOtherTabs(): void {
  useEffect(() => {
    const heard = ({ key }: StorageEvent) => {
      if (key === signedInKey) void queryClient.invalidateQueries({ queryKey: [roots.session] });
    };
    window.addEventListener('storage', heard);
    return () => window.removeEventListener('storage', heard);
  }, []);
}

api.on({ heard: () => {}, unheard: () => {}, sessionEnded: () => sessionLost('expired') });
