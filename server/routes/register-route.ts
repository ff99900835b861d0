import { createHash } from 'node:crypto';
import type { Request, Response, Router } from 'express';
import { leastRoleWith } from '@/shared/contract/roles';
import type { Deps, Member } from '../deps';
import { DomainError, forbidden, invalid } from '../errors/domain-error';
import { fieldsOf } from '../errors/zod-fields';
import { cookieOf } from '../middleware/cookies';
import { oneFile } from '../middleware/one-file';
import { addressKey } from '../services/limits';
import { checkKey, once, type Answer } from '../services/idempotency.service';
import { may } from '../services/may';
import { memberOf, wallOf } from '../services/who-asks';
import type { DeclaredHandler, Policy, RouteRegistrar, RouteSpec } from './define-route';
import { revisionOf } from './if-match';

type AnySpec = RouteSpec<unknown, unknown>;
interface Asker {
  member: Member | null;
  wall: { id: string; workshopId: string } | null;
}

const signedOut = () => new DomainError(401, 'signed_out', 'You are not signed in, or your session is over. Sign in.');

/** Lets in whom the policy names. @throws DomainError 401 or 403 */
async function admit(deps: Deps, policy: Policy, request: Request, now: number): Promise<Asker> {
  if (policy.kind === 'public') return { member: null, wall: null };
  // A wall's cookie opens only its own routes, a member's only theirs: the other kind of asker is nobody there.
  if (policy.kind === 'wall') {
    const wall = await wallOf(deps, cookieOf(request, 'bidewell_wall'), now);
    if (wall) return { member: null, wall };
    throw new DomainError(401, 'not_paired', 'This wall is not paired, or its pairing was taken back. Pair it again.');
  }
  const found = await memberOf(deps, cookieOf(request, 'bidewell_access'), now);
  if (!found) throw signedOut();
  const { member } = found;
  if (policy.kind === 'capability' && !(await may(deps.dataSource.manager, member, policy.capability))) {
    const least = leastRoleWith(policy.capability);
    request.log?.warn({ personId: member.personId, capability: policy.capability }, 'refused by role');
    throw forbidden(`This needs the role ${least}. You are signed in as ${member.role}.`);
  }
  return { member, wall: null };
}

/** Reads one part of the request through its schema. @throws DomainError 400 with the sentence per field */
function parsed(schema: AnySpec['body'], raw: unknown): unknown {
  if (!schema) return undefined;
  const result = schema.safeParse(raw, { reportInput: true });
  if (result.success) return result.data;
  throw invalid(fieldsOf(result.error));
}

function send(response: Response, answer: Answer): void {
  if (response.headersSent) return;
  if (answer.body === undefined) response.status(answer.status).end();
  else response.status(answer.status).json(answer.body);
}

const paramsOf = (request: Request): Record<string, string> =>
  Object.fromEntries(Object.entries(request.params).map(([name, value]) => [name, String(value)]));

const noFile = Buffer.alloc(0);

function handlerOf(deps: Deps, spec: AnySpec): DeclaredHandler {
  const handler: DeclaredHandler = async (request, response) => {
    const now = deps.clock.now();
    if (spec.limit) await deps.limits.take(spec.limit, addressKey(request.ip));
    const { member, wall } = await admit(deps, spec.policy, request, now);
    const key = spec.idempotent ? checkKey(request.get('idempotency-key')) : null;
    const rev = spec.ifMatch ? revisionOf(request.get('if-match')) : 0;
    const body = parsed(spec.body, request.body ?? {});
    const query = parsed(spec.query, request.query);
    const file = spec.file ? await oneFile(request, response, spec.file) : noFile;
    const work = async (): Promise<Answer> => {
      const result = await spec.handle({
        deps,
        // Null only where the policy gives none; the routes of a policy know what they have.
        member: member as Member,
        wall: wall as { id: string; workshopId: string },
        params: paramsOf(request),
        body,
        query,
        file,
        rev,
        now,
        request,
        response,
      });
      return { status: spec.status ?? (result === undefined ? 204 : 200), body: result };
    };
    if (key === null || !member) {
      send(response, await work());
      return;
    }
    const route = `${request.method} ${request.path}`;
    const content = spec.file ? { rev, file: createHash('sha256').update(file).digest('hex') } : { body, rev };
    send(response, await once(deps, member, { key, route, content }, now, work));
  };
  handler.policy = spec.policy;
  handler.asks = {
    ifMatch: spec.ifMatch === true,
    idempotent: spec.idempotent === true,
    body: spec.body !== undefined,
    file: spec.file !== undefined,
    limit: spec.limit ?? null,
  };
  return handler;
}

/**
 * Puts declared routes on the router, with everything before the handler in one place: throttle, who asks, may they,
 * key, revision, shape. `path` is under /api; one that begins with '//' stands outside it ('//healthz').
 * A handler that has sent its answer itself (a file, say) is left alone.
 */
export function makeRegistrar(router: Router, deps: Deps): RouteRegistrar {
  return (spec) => {
    if (spec.demoOnly && !deps.config.demo) return;
    if (spec.idempotent && (spec.policy.kind === 'public' || spec.policy.kind === 'wall'))
      throw new Error(`${spec.method} ${spec.path}: an Idempotency-Key belongs to a member.`);
    const path = spec.path.startsWith('//') ? spec.path.slice(1) : `/api${spec.path}`;
    // The registrar is generic in body and query; the handler only passes on what the spec's own schemas gave.
    router[spec.method](path, handlerOf(deps, spec as unknown as AnySpec));
  };
}
