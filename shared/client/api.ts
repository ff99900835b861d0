/**
 * The one door to the server: same origin, cookies, JSON, problem details as errors.
 *
 * An answer of 401 is met by one refresh of the session per browser, then the call is made once more. Calls that need
 * no session say `open` and are never refreshed.
 */
import { alone, type Alone } from './alone';
import { isProblem, OfflineError, problemOf } from './api-problem';
import { sendForm } from './send-form';
import { recall, remember } from './storage';

export interface CallOptions {
  query?: Record<string, string | number | boolean | null | undefined>;
  body?: unknown;
  /** A form with a file, or a file alone, in place of a JSON body. */
  form?: FormData | Blob;
  /** Hears how much of the form has gone out, as a share. */
  onSent?: (share: number) => void;
  /** Revision of what is changed; goes out as If-Match. */
  rev?: number;
  /** One per act of a person, kept over retries (see useWrite). */
  idempotencyKey?: string;
  /** Needs no session: a 401 is the answer, not a reason to refresh. */
  open?: boolean;
  signal?: AbortSignal;
}

/** What the door stands on; tests put their own in. */
export interface ApiEnvironment {
  fetch: (input: string, init: RequestInit) => Promise<Response>;
  /** Sends a form and tells how far it is; left out: without telling. */
  sendForm?: (input: string, init: RequestInit, onSent: (share: number) => void) => Promise<Response>;
  alone: Alone;
  now: () => number;
  recall: (key: string) => string | null;
  remember: (key: string, value: string | null) => void;
}

/** What others want to know of every call. */
export interface ApiEvents {
  /** The server answered; `serverDate` is its Date header in epoch ms where it could be read. */
  heard: (serverDate: number | null) => void;
  unheard: () => void;
  /** The session is over: refreshing was refused. */
  sessionEnded: () => void;
}

const refreshedKey = 'refreshed-at';

function addressOf(path: string, query: CallOptions['query']): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {}))
    if (value !== null && value !== undefined && value !== '') search.set(name, String(value));
  const text = search.toString();
  return `/api${path}${text ? `?${text}` : ''}`;
}

/** Makes the door. */
export function makeApi(env: ApiEnvironment) {
  const listeners: ApiEvents[] = [];
  let refreshing: Promise<boolean> | null = null;
  const tell = (what: (listener: ApiEvents) => void) => listeners.forEach(what);

  async function once(method: string, path: string, options: CallOptions): Promise<Response> {
    const headers: Record<string, string> = { accept: 'application/json' };
    if (options.body !== undefined) headers['content-type'] = 'application/json';
    if (options.rev !== undefined) headers['if-match'] = `"${options.rev}"`;
    if (options.idempotencyKey) headers['idempotency-key'] = options.idempotencyKey;
    let response: Response;
    try {
      const { form, onSent } = options;
      const init: RequestInit = {
        method,
        headers,
        credentials: 'same-origin',
        body: form ?? (options.body === undefined ? undefined : JSON.stringify(options.body)),
        signal: options.signal,
      };
      const address = addressOf(path, options.query);
      response =
        form && onSent && env.sendForm ? await env.sendForm(address, init, onSent) : await env.fetch(address, init);
    } catch (error) {
      if (options.signal?.aborted) throw error;
      tell((listener) => listener.unheard());
      throw new OfflineError(error);
    }
    const date = Date.parse(response.headers.get('date') ?? '');
    tell((listener) => listener.heard(Number.isFinite(date) ? date : null));
    return response;
  }

  /** True when the call is worth another try. `since`: when the refused call went out. */
  function refresh(since: number): Promise<boolean> {
    refreshing ??= env
      .alone('bidewell-refresh', async () => {
        // Another tab may have refreshed while this one waited: its cookies are ours too.
        if (Number(env.recall(refreshedKey)) > since) return true;
        const response = await once('POST', '/session/refresh', {});
        if (response.ok) {
          env.remember(refreshedKey, String(env.now()));
          return true;
        }
        if (response.status !== 401) throw await problemOf(response);
        tell((listener) => listener.sessionEnded());
        return false;
      })
      .finally(() => {
        refreshing = null;
      });
    return refreshing;
  }

  async function send(method: string, path: string, options: CallOptions): Promise<Response> {
    const since = env.now();
    let response = await once(method, path, options);
    if (response.status === 401 && !options.open && (await refresh(since))) {
      response = await once(method, path, options);
      if (response.status === 401) tell((listener) => listener.sessionEnded());
    }
    if (!response.ok) throw await problemOf(response);
    return response;
  }

  async function call<T>(method: string, path: string, options: CallOptions = {}): Promise<T> {
    const response = await send(method, path, options);
    // Callers of routes that answer nothing ask for void.
    if (response.status === 204) return undefined as T;
    try {
      return (await response.json()) as T;
    } catch (error) {
      throw new OfflineError(error); // The connection broke within the answer.
    }
  }

  return {
    get: <T>(path: string, options?: CallOptions) => call<T>('GET', path, options),
    post: <T>(path: string, body: unknown, options?: CallOptions) => call<T>('POST', path, { ...options, body }),
    /** A file, as a form or alone. */
    upload: <T>(path: string, form: FormData | Blob, options?: CallOptions) =>
      call<T>('POST', path, { ...options, form }),
    patch: <T>(path: string, body: unknown, options?: CallOptions) => call<T>('PATCH', path, { ...options, body }),
    put: <T>(path: string, body: unknown, options?: CallOptions) => call<T>('PUT', path, { ...options, body }),
    delete: <T = void>(path: string, options?: CallOptions) => call<T>('DELETE', path, options),
    /** The answer as a file. */
    blob: async (path: string, options: CallOptions = {}) => (await send('GET', path, options)).blob(),
    on: (events: ApiEvents) => {
      listeners.push(events);
      return () => void listeners.splice(listeners.indexOf(events), 1);
    },
  };
}
export type Api = ReturnType<typeof makeApi>;

export const api: Api = makeApi({
  fetch: (input, init) => fetch(input, init),
  sendForm,
  alone,
  now: () => Date.now(),
  recall,
  remember,
});

/** A key for one act of a person. `crypto.randomUUID` is missing over plain http. */
export function newKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** null for 'not there' answers, every other error as it is. */
export async function orNull<T>(answer: Promise<T>, statuses: readonly number[] = [404]): Promise<T | null> {
  try {
    return await answer;
  } catch (error) {
    if (isProblem(error) && statuses.includes(error.status)) return null;
    throw error;
  }
}
