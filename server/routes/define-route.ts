/**
 * Declares a route with its policy. The policy is attached to the handler that express runs, so that a test can walk
 * the running router and find every route's policy, or the lack of one.
 */
import type { Request, RequestHandler, Response, Router } from 'express';
import type * as z from 'zod/mini';
import type { Capability } from '@/shared/contract/roles';
import type { Deps, Member } from '../deps';
import type { FileRule } from '../middleware/one-file';
import type { AddressLimit } from '../services/limits';

/** Who may: anybody; any member; a member with a capability; a paired wall. */
export type Policy =
  { kind: 'public' } | { kind: 'member' } | { kind: 'capability'; capability: Capability } | { kind: 'wall' };

export type Method = 'get' | 'post' | 'patch' | 'put' | 'delete';

export interface RouteInput<Body, Query> {
  deps: Deps;
  /** Null on public and wall routes. */
  member: Member;
  wall: { id: string; workshopId: string };
  params: Record<string, string>;
  body: Body;
  query: Query;
  /** The file that came along; empty where the route takes none. */
  file: Buffer;
  /** Revision from If-Match; only where the route asks for it. */
  rev: number;
  now: number;
  request: Request;
  response: Response;
}

export interface RouteSpec<Body = undefined, Query = undefined> {
  method: Method;
  path: string;
  policy: Policy;
  body?: z.ZodMiniType<Body>;
  query?: z.ZodMiniType<Query>;
  /** The write carries one file as multipart/form-data, in place of a JSON body. */
  file?: FileRule;
  /** The write carries an Idempotency-Key; the stored answer is given again for the same key. */
  idempotent?: boolean;
  /** The write carries If-Match with the row's revision. */
  ifMatch?: boolean;
  /** Status of a good answer; 200 by default, 204 where nothing is returned. */
  status?: number;
  /** Throttle of the asking address; 429 beyond it. */
  limit?: AddressLimit;
  /** There only while the demo is on. */
  demoOnly?: boolean;
  handle: (input: RouteInput<Body, Query>) => Promise<unknown>;
}

export interface DeclaredHandler extends RequestHandler {
  policy?: Policy;
  /** What the route asks of a write, for the tests that walk the router. */
  asks?: { ifMatch: boolean; idempotent: boolean; body: boolean; file: boolean; limit: AddressLimit | null };
}

export type RouteRegistrar = <Body = undefined, Query = undefined>(spec: RouteSpec<Body, Query>) => void;

/** A resource's routes file exports one of these; create-app calls them all. */
export type RoutesModule = (route: RouteRegistrar, router: Router) => void;
