import http from 'node:http';
import type { AddressInfo } from 'node:net';
import { io, type Socket } from 'socket.io-client';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Person } from '@/server/entities/person';
import { Session } from '@/server/entities/session';
import { Wall } from '@/server/entities/wall';
import { Workshop } from '@/server/entities/workshop';
import { makeSocketHub, type SocketHub } from '@/server/live/socket-hub';
import { socketHandlers } from '@/server/live/socket-handlers';
import { hashToken } from '@/server/services/tokens';
import type { ClientToServerEvents, ServerToClientEvents } from '@/shared/contract/live';
import type { Role } from '@/shared/contract/roles';
import { makeTestServer, type TestServer, type TestWorkshop } from '@/tests/support/server';

type Client = Socket<ServerToClientEvents, ClientToServerEvents>;

let server: TestServer;
let hub: SocketHub;
let web: http.Server;
let port: number;
let clients: Client[];

beforeEach(async () => {
  server = await makeTestServer();
  hub = makeSocketHub(server.deps);
  web = http.createServer(server.app);
  hub.attach(web);
  await new Promise<void>((resolve) => web.listen(0, '127.0.0.1', resolve));
  port = (web.address() as AddressInfo).port;
  clients = [];
});
afterEach(async () => {
  for (const client of clients) client.disconnect();
  await hub.close();
  await server.close();
});

interface Options {
  cookie?: string;
  origin?: string;
  as?: string;
  transports?: ('websocket' | 'polling')[];
  headers?: Record<string, string>;
}
function connect(options: Options): Client {
  const client: Client = io(`http://127.0.0.1:${port}`, {
    transports: options.transports ?? ['websocket'],
    auth: { as: options.as ?? 'member' },
    reconnection: false,
    forceNew: true,
    extraHeaders: {
      ...(options.cookie ? { cookie: options.cookie } : {}),
      ...(options.origin ? { origin: options.origin } : {}),
      ...options.headers,
    },
  });
  clients.push(client);
  return client;
}
/** 'connected', or why not. */
const outcome = (client: Client) =>
  new Promise<string>((resolve) => {
    client.once('connect', () => resolve('connected'));
    client.once('connect_error', (error) => resolve(error.message));
  });
const once = <E extends keyof ServerToClientEvents>(client: Client, event: E) =>
  new Promise<Parameters<ServerToClientEvents[E]>[0]>((resolve) => {
    // One payload for each event; the client's own types cannot follow the name through a variable.
    client.once(event, ((payload: Parameters<ServerToClientEvents[E]>[0]) => resolve(payload)) as never);
  });
const disconnected = (client: Client) => new Promise<string>((resolve) => client.once('disconnect', resolve));
const member = (role: Role, workshop: TestWorkshop = server.own) =>
  connect({ cookie: server.agentFor(role, workshop).cookie() });

async function ready(client: Client): Promise<Client> {
  await Promise.all([outcome(client).then((result) => expect(result).toBe('connected')), once(client, 'heartbeat')]);
  return client;
}

async function addWall(): Promise<Wall> {
  const wall: Wall = {
    id: 'wall-1',
    workshopId: server.own.id,
    name: 'Wall',
    tokenHash: hashToken('the-token-of-the-wall'),
    diagonalInches: null,
    distanceMetres: null,
    approvedById: 'own-foreman',
    createdAt: 0,
    lastHeardAt: null,
    revokedAt: null,
  };
  await server.deps.dataSource.manager.insert(Wall, wall);
  return wall;
}
const wallCookie = 'bidewell_wall=the-token-of-the-wall';

describe('the handshake', () => {
  it.each(['websocket', 'polling'] as const)('over %s lets in who is signed in, and nobody else', async (transport) => {
    const transports = [transport];
    expect(await outcome(connect({ transports, cookie: server.agentFor('technician').cookie() }))).toBe('connected');
    expect(await outcome(connect({ transports }))).toBe('signed_out');
    expect(await outcome(connect({ transports, cookie: 'bidewell_access=rubbish' }))).toBe('signed_out');
  });

  it.each([
    ['ours', () => `http://127.0.0.1:${port}`, 'connected'],
    ['none', () => undefined, 'connected'],
    ['another site', () => 'http://evil.example', 'refused'],
    ['another port of this host', () => 'http://127.0.0.1:1', 'refused'],
    ['our host over https', () => `https://127.0.0.1:${port}`, 'refused'],
    ['a sandboxed page', () => 'null', 'refused'],
  ])('from the origin %s', async (_name, origin, expected) => {
    for (const transports of [['websocket'], ['polling']] as Options['transports'][]) {
      const result = await outcome(
        connect({ transports, cookie: server.agentFor('technician').cookie(), origin: origin() }),
      );
      expect(result === 'connected' ? result : 'refused').toBe(expected);
    }
  });

  it('does not believe forwarded headers while no proxy is set', async () => {
    const result = await outcome(
      connect({
        cookie: server.agentFor('technician').cookie(),
        origin: 'http://evil.example',
        headers: { 'x-forwarded-host': 'evil.example', 'x-forwarded-proto': 'http' },
      }),
    );
    expect(result).not.toBe('connected');
  });

  it('takes a wall by its own cookie only, and a person by theirs only', async () => {
    await addWall();
    expect(await outcome(connect({ as: 'wall', cookie: wallCookie }))).toBe('connected');
    expect(await outcome(connect({ as: 'member', cookie: wallCookie }))).toBe('signed_out');
    expect(await outcome(connect({ as: 'wall', cookie: server.agentFor('manager').cookie() }))).toBe('signed_out');
    await server.deps.dataSource.manager.update(Wall, { id: 'wall-1' }, { revokedAt: 1 });
    expect(await outcome(connect({ as: 'wall', cookie: wallCookie }))).toBe('signed_out');
  });

  it('refuses a disabled person and an ended session', async () => {
    const { manager } = server.deps.dataSource;
    await manager.update(Person, { id: 'own-technician' }, { disabledAt: 1 });
    expect(await outcome(member('technician'))).toBe('signed_out');
    await manager.update(Session, { id: 'session-own-foreman' }, { endedAt: 1 });
    expect(await outcome(member('foreman'))).toBe('signed_out');
  });
});

describe('an announcement', () => {
  it('reaches all members of its workshop and nobody of another', async () => {
    const [technician, manager, stranger] = [member('technician'), member('manager'), member('manager', server.other)];
    await Promise.all([technician, manager, stranger].map(ready));
    const strange: unknown[] = [];
    stranger.onAny((event: string) => strange.push(event));
    const event = { rev: 7, at: new Date(0).toISOString(), chargeId: 'c1' };
    const heard = [once(technician, 'board:changed'), once(manager, 'board:changed')];
    hub.toWorkshop(server.own.id, 'board:changed', event);
    expect(await Promise.all(heard)).toEqual([event, event]);
    // The stranger hears what is theirs after it, so that 'nothing came' means something.
    const theirs = once(stranger, 'stock:changed');
    hub.toWorkshop(server.other.id, 'stock:changed', { at: event.at });
    await theirs;
    expect(strange).toEqual(['stock:changed']);
  });

  it('to one person reaches their sockets only', async () => {
    const [technician, foreman] = [member('technician'), member('foreman')];
    await Promise.all([technician, foreman].map(ready));
    const others: string[] = [];
    foreman.onAny((event: string) => others.push(event));
    const mine = once(technician, 'alert:changed');
    hub.toPerson(server.own.id, 'own-technician', 'alert:changed', { id: 'a', at: '' });
    expect(await mine).toEqual({ id: 'a', at: '' });
    const both = once(foreman, 'people:changed');
    hub.toWorkshop(server.own.id, 'people:changed', { at: '' });
    await both;
    expect(others).toEqual(['people:changed']);
  });

  it('reaches a wall only as what its board shows otherwise: nothing of people, stock, alerts or who else listens', async () => {
    await addWall();
    const wall = await ready(connect({ as: 'wall', cookie: wallCookie }));
    const heard: string[] = [];
    wall.onAny((event: string) => heard.push(event));
    for (const event of ['people:changed', 'stock:changed', 'equipment:changed', 'walls:changed'] as const)
      hub.toWorkshop(server.own.id, event, { at: '' });
    hub.toWorkshop(server.own.id, 'alert:changed', { id: 'a', at: '' });
    hub.toWorkshop(server.own.id, 'charge:changed', { id: 'c', rev: 3, at: '' });
    const told = once(wall, 'wall:changed');
    await server.deps.dataSource.manager.update(Workshop, { id: server.own.id }, { boardRev: 2 });
    hub.toWorkshop(server.own.id, 'board:changed', { rev: 2, at: '', chargeId: null });
    expect(await told).toMatchObject({ from: 1, rev: 2, cards: [], order: null, channels: null });
    expect(heard).toEqual(['wall:changed']);
  });

  it('of a board whose reading fails sends the walls to read it for themselves, and the next is told again', async () => {
    await addWall();
    const wall = await ready(connect({ as: 'wall', cookie: wallCookie }));
    const { manager } = server.deps.dataSource;
    const find = vi.spyOn(manager, 'find').mockRejectedValue(new Error('gone'));
    const failed = once(wall, 'wall:changed');
    hub.toWorkshop(server.own.id, 'board:changed', { rev: 2, at: '', chargeId: null });
    expect(await failed).toEqual({ from: null, rev: 2 });
    find.mockRestore();
    // What is kept was thrown away, so this one is read whole and has nothing to differ from.
    const next = once(wall, 'wall:changed');
    await manager.update(Workshop, { id: server.own.id }, { boardRev: 3 });
    hub.toWorkshop(server.own.id, 'board:changed', { rev: 3, at: '', chargeId: null });
    expect(await next).toEqual({ from: null, rev: 3 });
    const last = once(wall, 'wall:changed');
    await manager.update(Workshop, { id: server.own.id }, { boardRev: 4 });
    hub.toWorkshop(server.own.id, 'board:changed', { rev: 4, at: '', chargeId: null });
    expect(await last).toMatchObject({ from: 3, rev: 4 });
  });
});

describe('the heartbeat', () => {
  it('comes at once and then every round, with the board’s revision', async () => {
    await server.deps.dataSource.manager.update(Workshop, { id: server.own.id }, { boardRev: 42 });
    const client = member('technician');
    expect(await once(client, 'heartbeat')).toEqual({ at: new Date(server.clock.now()).toISOString(), rev: 42 });
    server.clock.advance(10_000);
    const next = once(client, 'heartbeat');
    await hub.beat();
    expect(await next).toEqual({ at: new Date(server.clock.now()).toISOString(), rev: 42 });
  });

  it('notes when walls were heard of', async () => {
    await addWall();
    await ready(connect({ as: 'wall', cookie: wallCookie }));
    server.clock.advance(5 * 60_000);
    await hub.beat();
    const wall = await server.deps.dataSource.manager.findOneByOrFail(Wall, { id: 'wall-1' });
    expect(wall.lastHeardAt).toBe(server.clock.now());
  });
});

describe('a socket is closed at once, with its reason, by', () => {
  const closes = async (client: Client, reason: string, act: () => Promise<unknown> | void) => {
    await ready(client);
    const [told, closed] = [once(client, 'session:ended'), disconnected(client)];
    await act();
    expect((await told).reason).toBe(reason);
    expect(await closed).toBe('io server disconnect');
  };

  it('sign-out of its session, and only that one', async () => {
    const other = await ready(member('foreman'));
    await closes(member('technician'), 'sign-out', () => hub.end({ sessionId: 'session-own-technician' }, 'sign-out'));
    expect(other.connected).toBe(true);
  });

  it('a person’s being switched off', () =>
    closes(member('technician'), 'disabled', () => hub.end({ personId: 'own-technician' }, 'disabled')));

  it('a wall’s right being taken back', async () => {
    await addWall();
    await closes(connect({ as: 'wall', cookie: wallCookie }), 'revoked', () =>
      hub.end({ wallId: 'wall-1' }, 'revoked'),
    );
  });

  it('the next heartbeat, where something else than this process ended it', async () => {
    const { manager } = server.deps.dataSource;
    await closes(member('technician'), 'role-changed', async () => {
      await manager.update(Person, { id: 'own-technician' }, { role: 'foreman' });
      await hub.beat();
    });
    await closes(member('foreman'), 'disabled', async () => {
      await manager.update(Person, { id: 'own-foreman' }, { disabledAt: 1 });
      await hub.beat();
    });
    await closes(member('manager'), 'expired', async () => {
      await manager.update(Session, { id: 'session-own-manager' }, { expiresAt: server.clock.now() });
      await hub.beat();
    });
    await closes(member('manager', server.other), 'revoked', async () => {
      await manager.update(Session, { id: 'session-other-manager' }, { endedAt: 1 });
      await hub.beat();
    });
  });

  it('the server’s stop; and clients see a lost connection, so that they come back by themselves', async () => {
    const client = await ready(member('technician'));
    const closed = disconnected(client);
    await hub.close();
    expect(await closed).toBe('transport close');
  });
});

describe('what a client may send', () => {
  it('is the clock question: answered with the server’s instants', async () => {
    const client = await ready(member('technician'));
    const reply = await client.timeout(2000).emitWithAck('clock:ask', 5);
    expect(reply).toEqual({ receivedAt: server.clock.now(), sentAt: server.clock.now() });
    // Without a way to answer it harms nobody.
    client.emit('clock:ask', 5, undefined as never);
    await client.timeout(2000).emitWithAck('clock:ask', 6);
  });

  it('is nothing else: another event closes the socket', async () => {
    const client = await ready(member('manager'));
    const closed = disconnected(client);
    (client as unknown as { emit: (event: string, body: unknown) => void }).emit('charge:start', { id: 'x' });
    expect(await closed).toBe('io server disconnect');
  });

  it('every handler says who may send it, and a running socket listens to no other', async () => {
    for (const handler of socketHandlers) {
      expect(handler.policy.length, `the socket handler ${handler.event} has no policy`).toBeGreaterThan(0);
      for (const kind of handler.policy) expect(['member', 'wall']).toContain(kind);
    }
    await addWall();
    await ready(member('technician'));
    await ready(connect({ as: 'wall', cookie: wallCookie }));
    const listened = hub.listenedEvents();
    expect(Object.keys(listened).sort()).toEqual(['member', 'wall']);
    for (const [kind, events] of Object.entries(listened))
      expect(events.sort()).toEqual(
        socketHandlers.filter(({ policy }) => policy.includes(kind as 'member')).map(({ event }) => event),
      );
  });
});
