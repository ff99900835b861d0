/** Sends one waiting write and says what became of it. */
import type { ChargeDto } from '@/shared/contract/charge';
import type { Api } from '../api';
import { isProblem, type ApiProblem } from '../api-problem';
import { pathOf, revOf, type Refusal, type WaitingWrite } from './waiting-write';

export type Sent =
  | { kind: 'sent'; charge: ChargeDto }
  /** It was done at an earlier try whose answer was lost. */
  | { kind: 'done' }
  | { kind: 'refused'; refusal: Refusal; problem: ApiProblem }
  /** The server stumbled, or is at it: the later ones of this charge wait too, others go on. */
  | { kind: 'later' }
  /** No connection, or no session (`problem`): everything waits. */
  | { kind: 'stop'; problem: ApiProblem | null };

/** A server that does not answer is a connection that is not there, ms. */
const patienceMs = 20_000;
/** A charge that goes on by the clock moves its revision under a check that nobody else has touched. */
const mostRevisions = 3;

/** Waits for an answer so long, then gives it up: the next try carries the same key. */
async function posted(post: Api['post'], write: WaitingWrite): Promise<ChargeDto> {
  const over = new AbortController();
  const timer = setTimeout(() => over.abort(), patienceMs);
  try {
    return await post<ChargeDto>(pathOf(write), write.input, {
      idempotencyKey: write.key,
      rev: revOf(write),
      signal: over.signal,
    });
  } finally {
    clearTimeout(timer);
  }
}

const sentences: Readonly<Record<string, string>> = {
  key_reused: 'It was taken already, as it was before your change. See the charge, then remove it here.',
};

const refusalOf = (problem: ApiProblem): Refusal => {
  const fields = Object.values(problem.fields);
  return {
    code: problem.code,
    text: sentences[problem.code] ?? (fields.length > 0 ? fields.join(' ') : problem.message),
  };
};

/** The check as it fits the charge that has only gone on by the clock; null: somebody has checked, or it rests no more. */
function onTop(write: WaitingWrite, problem: ApiProblem): WaitingWrite | null {
  if (write.kind !== 'rest-check' || problem.status !== 412) return null;
  const present = problem.present as Partial<ChargeDto> | null;
  const rests = present?.stage === 'resting' || present?.stage === 'check-due';
  if (!rests || present.rev === undefined || present.restChecks?.length !== write.checks) return null;
  return { ...write, rev: present.rev };
}

/** @param post the API's; its refusals are ApiProblems, anything else is a connection that is not there */
export async function sendWaiting(post: Api['post'], write: WaitingWrite): Promise<Sent> {
  let present = write;
  for (let tries = 1; ; tries++) {
    try {
      return { kind: 'sent', charge: await posted(post, present) };
    } catch (error) {
      if (!isProblem(error) || error.status === 429) return { kind: 'stop', problem: null };
      if (error.status === 401) return { kind: 'stop', problem: error };
      if (error.status >= 500 || error.code === 'still_running') return { kind: 'later' };
      if (error.code === 'done_already') return { kind: 'done' };
      const next = tries < mostRevisions ? onTop(present, error) : null;
      if (next === null) return { kind: 'refused', refusal: refusalOf(error), problem: error };
      present = next;
    }
  }
}
