import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Deps, Member } from '../deps';
import { DomainError, invalid } from '../errors/domain-error';
import {
  deleteKeysBefore,
  dropAnswersBefore,
  findKey,
  insertKey,
  storeAnswer,
} from '../repositories/idempotency-keys.repository';
import { idempotencyContext, type IdempotentWrite } from './idempotency-context';
import { newId } from './ids';
import { inTransaction } from './unit-of-work';

const dayMs = 24 * 60 * 60_000;
const answersKeptForMs = dayMs;
/**
 * Longer than a device keeps a write that waits for its connection (`keptForMs` in shared/client/waiting): one whose
 * answer was lost is told weeks later that it was done, and is not done again.
 */
const keysKeptForMs = 45 * dayMs;
/** Status of a row whose effect is committed and whose answer is not stored: not yet, or not any more. */
export const withoutAnswer = 0;

export interface Answer {
  status: number;
  body: unknown;
}

const running = new WeakMap<object, Set<string>>();

/** Text of a JSON value that does not depend on the order of its keys. */
function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  if (value !== null && typeof value === 'object')
    return `{${Object.entries(value)
      .filter(([, part]) => part !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, part]) => `${JSON.stringify(name)}:${canonical(part)}`)
      .join(',')}}`;
  return JSON.stringify(value) ?? 'null';
}

const tidyEveryMs = 60 * 60_000;
const tidiedAt = new WeakMap<object, number>();

/** Drops what is too old, once an hour and with the first write: every write would else look through weeks of keys. */
async function tidy(deps: Deps, manager: EntityManager, now: number): Promise<void> {
  const last = tidiedAt.get(deps.dataSource);
  if (last !== undefined && Math.abs(now - last) < tidyEveryMs) return;
  tidiedAt.set(deps.dataSource, now);
  await deleteKeysBefore(manager, now - keysKeptForMs);
  await dropAnswersBefore(manager, now - answersKeptForMs, withoutAnswer);
}

/** @throws DomainError 400 for a key that is missing or not usable */
export function checkKey(header: string | undefined): string {
  if (header === undefined)
    throw invalid({ 'Idempotency-Key': 'Send an Idempotency-Key with this write, one for each thing you want done.' });
  const key = header.trim().replace(/^"(.*)"$/, '$1');
  if (!/^[A-Za-z0-9_-]{8,128}$/.test(key))
    throw invalid({ 'Idempotency-Key': 'The Idempotency-Key has 8 to 128 letters, digits, - or _.' });
  return key;
}

/**
 * Does a write once for its key: the same key with the same content gets the stored answer, with other content 422,
 * while the first is under way 409. The key's row is committed together with the effect. Refusals are not stored, so
 * that a corrected try may keep its key.
 * @param route method and filled-in path, so that one key may serve several rows
 * @param content what makes two writes the same: body and revision
 */
export async function once(
  deps: Deps,
  member: Member,
  request: { key: string; route: string; content: unknown },
  now: number,
  work: () => Promise<Answer>,
): Promise<Answer> {
  const { key, route } = request;
  const { workshopId, personId } = member;
  const bodyHash = createHash('sha256').update(canonical(request.content)).digest('base64url');
  const underWay = running.get(deps.dataSource) ?? new Set<string>();
  running.set(deps.dataSource, underWay);
  const name = `${personId} ${route} ${key}`;
  if (underWay.has(name))
    throw new DomainError(409, 'still_running', 'This is being done already. Ask again in a moment.', {
      retryAfterS: 1,
    });
  underWay.add(name);
  try {
    const stored = await findKey(deps.dataSource.manager, workshopId, personId, route, key);
    if (stored) return replay(stored, bodyHash);
    const id = newId();
    const write: IdempotentWrite = {
      recorded: false,
      record: async (manager) => {
        await tidy(deps, manager, now);
        await insertKey(manager, {
          id,
          workshopId,
          personId,
          route,
          key,
          bodyHash,
          status: withoutAnswer,
          response: { body: null },
          createdAt: now,
        });
      },
    };
    const answer = await idempotencyContext.run(write, work);
    await idempotencyContext.exit(() =>
      inTransaction(deps, async (manager) => {
        if (!write.recorded) await write.record(manager);
        await storeAnswer(manager, workshopId, id, answer.status, { body: answer.body ?? null });
      }),
    );
    write.recorded = true; // Whatever the request has set going writes no key any more.
    return answer;
  } finally {
    underWay.delete(name);
  }
}

function replay(stored: { bodyHash: string; status: number; response: unknown }, bodyHash: string): Answer {
  const { body } = stored.response as { body: unknown };
  if (stored.bodyHash !== bodyHash)
    throw new DomainError(
      422,
      'key_reused',
      'This Idempotency-Key was used for something else. Take a new key for each thing you want done.',
    );
  if (stored.status === withoutAnswer)
    throw new DomainError(
      409,
      'done_already',
      'This was done already, and its answer was lost. Read how it stands now.',
    );
  return { status: stored.status, body: body ?? undefined };
}
