import { createHash } from 'node:crypto';
import type { Deps, Member } from '../deps';
import { DomainError, invalid } from '../errors/domain-error';
import { deleteKeysBefore, findKey, insertKey, storeAnswer } from '../repositories/idempotency-keys.repository';
import { idempotencyContext, type IdempotentWrite } from './idempotency-context';
import { newId } from './ids';
import { inTransaction } from './unit-of-work';

const keptForMs = 24 * 60 * 60_000;
/** Status of a row whose effect is committed and whose answer is not stored yet. */
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
        await deleteKeysBefore(manager, now - keptForMs);
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
