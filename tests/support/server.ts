/**
 * The server of the tests: the real application over an in-memory database that the migrations made, a clock moved by
 * hand, and a hub that records what it is told. Two workshops, each with a person of every role.
 */
import type { Express } from 'express';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import request, { type Test } from 'supertest';
import { makeLog } from '@/server/middleware/request-log';
import { createApp } from '@/server/create-app';
import { makeDataSource } from '@/server/data-source';
import type { Deps } from '@/server/deps';
import type { Config } from '@/server/config';
import { Person } from '@/server/entities/person';
import { Session } from '@/server/entities/session';
import { Workshop } from '@/server/entities/workshop';
import type { LiveEvent, LiveHub } from '@/server/live/hub';
import { makeBenchSolver } from '@/server/services/bench-plan/bench-solver';
import { solveTask } from '@/server/services/bench-plan/solve';
import { signAccessToken } from '@/server/services/access-token';
import { makeBackups } from '@/server/services/backups';
import { makeLimits, type LimitName, type LimitRule } from '@/server/services/limits';
import { makeMetrics } from '@/server/services/metrics';
import type { Passwords } from '@/server/services/passwords';
import { secretsFrom } from '@/server/services/secrets';
import { solveWaits } from '@/server/services/waits/solve-waits';
import { makeWaitsSolver } from '@/server/services/waits/waits-solver';
import { wallBoard } from '@/server/services/board.service';
import { makeWallBoards, type WallBoards } from '@/server/services/wall-boards';
import { defaultSettings } from '@/server/services/workshop-defaults';
import { roles, type Role } from '@/shared/contract/roles';

/** Tuesday 9 June 2026, 10:00 in Berlin. */
export const testNow = Date.parse('2026-06-09T08:00:00.000Z');

export interface TestClock {
  now(): number;
  /** Moves on by so many milliseconds (back with a negative number). */
  advance(ms: number): void;
  set(ms: number): void;
}

export function makeTestClock(now = testNow): TestClock {
  let at = now;
  return {
    now: () => at,
    advance: (ms) => void (at += ms),
    set: (ms) => void (at = ms),
  };
}

export interface Announcement {
  workshopId?: string;
  personId?: string;
  event: LiveEvent | 'end';
  payload: unknown;
}

export interface RecordingHub extends LiveHub {
  told: Announcement[];
  /** The payloads of one event, oldest first. */
  of(event: LiveEvent | 'end'): unknown[];
}

/** @param wallBoards hears what was committed, as the real hub tells it */
export function makeRecordingHub(wallBoards?: Pick<WallBoards, 'changed'>): RecordingHub {
  const told: Announcement[] = [];
  return {
    told,
    of: (event) => told.filter((entry) => entry.event === event).map((entry) => entry.payload),
    toWorkshop: (workshopId, event, payload) => {
      wallBoards?.changed(workshopId);
      told.push({ workshopId, event, payload });
    },
    toPerson: (workshopId, personId, event, payload) => void told.push({ workshopId, personId, event, payload }),
    connected: () => 0,
    end: (target, reason) => void told.push({ event: 'end', payload: { ...target, reason } }),
  };
}

export interface CountingPasswords extends Passwords {
  hashed: number;
  compared: number;
}

/** Stands in for bcrypt where hashing is not the subject; counts its calls. */
export function makeCountingPasswords(): CountingPasswords {
  const quick = (password: string) => `quick$${createHash('sha256').update(password).digest('hex')}`;
  const passwords: CountingPasswords = {
    hashed: 0,
    compared: 0,
    hash: async (password) => {
      passwords.hashed += 1;
      return quick(password);
    },
    matches: async (password, hash) => {
      passwords.compared += 1;
      return hash !== null && quick(password) === hash;
    },
    close: async () => {},
  };
  return passwords;
}

export interface TestWorkshop {
  id: string;
  people: Record<Role, { id: string; name: string; email: string; sessionId: string; password: string }>;
}

/** Sends requests signed in as one person; its access token is always fresh by the test's clock. */
export interface TestAgent {
  get(path: string): Test;
  post(path: string, body?: object): Test;
  patch(path: string, body?: object): Test;
  put(path: string, body?: object): Test;
  delete(path: string): Test;
  /** Sends one file as a form. */
  upload(path: string, field: string, bytes: Buffer, name: string): Test;
  cookie(): string;
}

export interface TestServerOptions {
  demo?: boolean;
  now?: number;
  config?: Partial<Config>;
  limits?: Partial<Record<LimitName, LimitRule>>;
  /** More of the dependencies replaced: a sleeper, a hub. */
  deps?: Partial<Deps>;
  /** Without the two workshops: an installation nobody has used. */
  empty?: boolean;
}

export interface TestServer {
  app: Express;
  deps: Deps;
  clock: TestClock;
  hub: RecordingHub;
  passwords: CountingPasswords;
  own: TestWorkshop;
  other: TestWorkshop;
  /** A member's agent: by role in the own workshop, or in the other one. */
  agentFor(role: Role, workshop?: TestWorkshop): TestAgent;
  /** Nobody's agent. */
  anyone: TestAgent;
  close(): Promise<void>;
}

export const testPassword = 'quiet harbour lantern 7';

let folders = 0;
/** A data folder of its own for every server; made with the first file that goes there, removed when it closes. */
const newDataDir = (): string => path.join(os.tmpdir(), `bidewell-test-${process.pid}-${(folders += 1)}`);

/** One for all servers of a test file: it watches the process, of which there is one. */
const metrics = makeMetrics('test');

/** Settings of a server that reaches nobody outside. */
export const testConfig: Omit<Config, 'dataDir'> = {
  port: 0,
  host: '127.0.0.1',
  webDir: '/nonexistent',
  demo: false,
  tls: null,
  proxyHops: 0,
  publicUrl: null,
  logLevel: 'silent',
  metroPort: null,
  backupHours: 0,
  metricsToken: null,
  mail: null,
  expoToken: null,
  localPush: false,
};

async function addWorkshop(deps: Deps, name: 'own' | 'other', now: number): Promise<TestWorkshop> {
  const id = `workshop-${name}`;
  await deps.dataSource.manager.insert(Workshop, {
    ...defaultSettings(`The ${name} workshop`, 'Europe/Berlin'),
    id,
    boardRev: 1,
    chargeCount: 0,
    rev: 1,
    createdAt: now,
  });
  const people = {} as TestWorkshop['people'];
  for (const role of roles) {
    const person = {
      id: `${name}-${role}`,
      name: `${role[0]?.toUpperCase()}${role.slice(1)} of ${name}`,
      email: `${role}@${name}.example.com`,
      sessionId: `session-${name}-${role}`,
      password: testPassword,
    };
    people[role] = person;
    await deps.dataSource.manager.insert(Person, {
      id: person.id,
      workshopId: id,
      name: person.name,
      email: person.email,
      passwordHash: await deps.passwords.hash(testPassword),
      role,
      disabledAt: null,
      lastSeenAt: null,
      rev: 1,
      createdAt: now,
    });
    await deps.dataSource.manager.insert(Session, {
      id: person.sessionId,
      workshopId: id,
      personId: person.id,
      tokenHash: `never-${person.sessionId}`,
      previousTokenHash: null,
      successor: null,
      rotatedAt: null,
      device: 'Test',
      createdAt: now,
      // Far ahead, so that a test may move its clock by weeks.
      lastUsedAt: now + 1e12,
      expiresAt: now + 1e12,
      endedAt: null,
      endReason: null,
    });
  }
  return { id, people };
}

const withCookie = (test: Test, cookie: string): Test => (cookie ? test.set('Cookie', cookie) : test);

export const makeAgent = (app: Express, cookie: () => string): TestAgent => ({
  get: (path) => withCookie(request(app).get(path), cookie()),
  post: (path, body) => withCookie(request(app).post(path), cookie()).send(body ?? {}),
  put: (path, body) => withCookie(request(app).put(path), cookie()).send(body ?? {}),
  patch: (path, body) => withCookie(request(app).patch(path), cookie()).send(body ?? {}),
  delete: (path) => withCookie(request(app).delete(path), cookie()),
  upload: (path, field, bytes, name) => withCookie(request(app).post(path), cookie()).attach(field, bytes, name),
  cookie,
});

/** A running application for one test file or one test. Close it afterwards. */
export async function makeTestServer(options: TestServerOptions = {}): Promise<TestServer> {
  const clock = makeTestClock(options.now);
  const passwords = makeCountingPasswords();
  const dataSource = await makeDataSource(':memory:').initialize();
  const wallBoards = makeWallBoards((workshopId, now) => wallBoard({ dataSource }, workshopId, now));
  const hub = makeRecordingHub(wallBoards);
  await dataSource.runMigrations();
  const dataDir = newDataDir();
  const config: Config = { ...testConfig, dataDir, demo: options.demo ?? false, ...options.config };
  const deps: Deps = {
    dataSource,
    clock,
    config,
    log: makeLog('silent'),
    hub,
    wallBoards,
    sleeper: { poke: () => {} },
    outbox: { poke: () => {}, pushKey: 'BKey', eMail: false },
    lifecycle: { ready: true, startedAt: clock.now() },
    passwords,
    // The same reckoning, on this thread: what the thread itself does has tests of its own.
    bench: makeBenchSolver({ run: async (task) => solveTask(task), close: async () => {} }),
    waits: makeWaitsSolver({ run: async (task) => solveWaits(task), close: async () => {} }),
    secrets: secretsFrom(Buffer.alloc(32, 7)),
    limits: makeLimits(options.limits),
    backups: makeBackups({ dataDir, everyHours: 0, clock, log: makeLog('silent') }),
    metrics,
    outside: null,
    ...options.deps,
  };
  const none = { id: '', people: {} as TestWorkshop['people'] };
  const own = options.empty ? none : await addWorkshop(deps, 'own', clock.now());
  const other = options.empty ? none : await addWorkshop(deps, 'other', clock.now());
  const app = createApp(deps);
  return {
    app,
    deps,
    clock,
    hub,
    passwords,
    own,
    other,
    agentFor: (role, workshop = own) =>
      makeAgent(app, () => {
        const { id: personId, sessionId } = workshop.people[role];
        const token = signAccessToken(deps.secrets, { personId, workshopId: workshop.id, sessionId }, clock.now());
        return `bidewell_access=${token}`;
      }),
    anyone: makeAgent(app, () => ''),
    close: async () => {
      await dataSource.destroy();
      fs.rmSync(dataDir, { recursive: true, force: true });
    },
  };
}
