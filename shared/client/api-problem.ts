import type { ChangedDto, ProblemDto } from '@/shared/contract/common';

/** The server answered, and it was a refusal. `message` is a sentence for people. */
export class ApiProblem extends Error {
  readonly status: number;
  readonly code: string;
  /** Field path ('groupVolts.1') → sentence. */
  readonly fields: Readonly<Record<string, string>>;
  /** The present state of what somebody else has changed (412) or taken (409). */
  readonly present: unknown;
  /** Who made it so and when, where the server knows it; `message` says it already. */
  readonly changed: ChangedDto | null;
  readonly requestId: string | undefined;
  readonly retryAfterS: number | null;

  constructor(problem: Partial<ProblemDto> & { status: number }, retryAfterS: number | null = null) {
    super(problem.detail ?? problem.title ?? `The server answered with an error (${problem.status}). Try again.`);
    this.name = 'ApiProblem';
    this.status = problem.status;
    this.code = problem.code ?? 'unknown';
    this.fields = problem.fields ?? {};
    this.present = problem.present;
    this.changed = problem.changed ?? null;
    this.requestId = problem.requestId;
    this.retryAfterS = retryAfterS;
  }
}

/** The server was not reached: nothing is known of what it did. */
export class OfflineError extends Error {
  constructor(cause?: unknown) {
    super('No connection to the server. What you typed is kept; try again when the connection is back.', { cause });
    this.name = 'OfflineError';
  }
}

export const isProblem = (error: unknown): error is ApiProblem => error instanceof ApiProblem;
export const isOffline = (error: unknown): error is OfflineError => error instanceof OfflineError;
/** Somebody else was first (409 taken, 412 changed): the screen shows `present` and offers the next step. */
export const isConflict = (error: unknown): error is ApiProblem =>
  isProblem(error) && (error.status === 409 || error.status === 412);
/** Worth another try by itself: not reached, or the server stumbled. */
export const isPassing = (error: unknown): boolean =>
  isOffline(error) || (isProblem(error) && (error.status >= 500 || error.status === 429));

/** The sentence to show for any error. */
export const sentenceOf = (error: unknown): string =>
  error instanceof Error && (isProblem(error) || isOffline(error))
    ? error.message
    : 'Something failed on this device. Load the page again; what you typed is kept.';

/** Reads problem details off a bad answer; a proxy's own page becomes a plain sentence. */
export async function problemOf(response: Response): Promise<ApiProblem> {
  const retryAfter = Number(response.headers.get('retry-after'));
  const retryAfterS = Number.isFinite(retryAfter) && retryAfter > 0 ? retryAfter : null;
  const type = response.headers.get('content-type') ?? '';
  if (type.includes('json')) {
    try {
      const body = (await response.json()) as Partial<ProblemDto>;
      return new ApiProblem({ ...body, status: response.status }, retryAfterS);
    } catch {
      // Not JSON after all.
    }
  }
  return new ApiProblem({ status: response.status }, retryAfterS);
}
