import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoWorkshopId } from '@/server/demo/demo-workshop';
import { passwordsFile, seedDemo } from '@/server/demo/seed';
import { Charge } from '@/server/entities/charge';
import { ChannelHold } from '@/server/entities/channel-hold';
import { RestCheck } from '@/server/entities/rest-check';
import { WorkStint } from '@/server/entities/work-stint';
import { Workshop } from '@/server/entities/workshop';
import type { AlertDto } from '@/shared/contract/alert';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ChargerDto, ModuleTypeDto } from '@/shared/contract/equipment';
import type { PersonDto } from '@/shared/contract/people';
import type { RepairListDto, RepairPageDto } from '@/shared/contract/repair';
import type { SpareDto } from '@/shared/contract/spare';
import type { WaitGroupsDto, WaitsDto } from '@/shared/contract/waits';
import type { WallDto } from '@/shared/contract/wall';
import type { Role } from '@/shared/contract/roles';
import { cookiesOf } from '../../support/cookies';
import { makeAgent, makeTestServer, testNow, type TestAgent, type TestServer } from '../../support/server';

let server: TestServer;
let dataDir: string;
const agents = {} as Record<Role, TestAgent>;

const seeded = async (now: number): Promise<TestServer> => {
  const fresh = await makeTestServer({ empty: true, demo: true, now, config: { dataDir } });
  await seedDemo(fresh.deps);
  return fresh;
};

beforeAll(async () => {
  dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-demo-'));
  server = await seeded(testNow);
  for (const role of ['technician', 'foreman', 'manager'] as const) {
    const signedIn = await server.anyone.post('/api/demo/sign-in', { role }).expect(200);
    const cookie = `bidewell_access=${cookiesOf(signedIn).bidewell_access!.value}`;
    agents[role] = makeAgent(server.app, () => cookie);
  }
}, 240_000);
afterAll(async () => {
  await server.close();
  fs.rmSync(dataDir, { recursive: true, force: true });
});

const read = async <Dto>(path: string, role: Role = 'manager'): Promise<Dto> =>
  (await agents[role].get(path).expect(200)).body as Dto;

describe('the open charges of the demo', () => {
  it('stand in every stage, each with its repair', async () => {
    const { charges } = await read<BoardDto>('/api/board');
    const stages = Object.fromEntries(charges.map(({ title, stage }) => [title, stage]));
    expect(stages).toEqual({
      'R-2406': 'tapering',
      'R-2408': 'ready',
      'R-2409': 'check-due',
      'R-2411': 'charging',
      'R-2412': 'resting',
      'R-2413': 'tapering',
      'R-2415': 'discharging',
      'R-2417': 'held',
      'R-2418': 'queued',
      'R-2423': 'planned',
    });
  });

  it('have one that is overdue, and nobody has taken its alarm; no alert was told late', async () => {
    const { charges } = await read<BoardDto>('/api/board');
    expect(charges.filter(({ overdueSince }) => overdueSince !== null).map(({ title }) => title)).toEqual(['R-2406']);
    const alerts = await read<AlertDto[]>('/api/alerts');
    const open = alerts.filter(({ clearedAt }) => clearedAt === null);
    expect(open.map(({ kind, takenBy }) => [kind, takenBy])).toEqual(
      expect.arrayContaining([
        ['overdue', null],
        ['check-due', null],
      ]),
    );
    for (const { seen, raisedAt } of alerts) {
      expect(seen).not.toContain('late');
      expect(Date.parse(raisedAt)).toBeLessThanOrEqual(testNow);
    }
  });

  it('were read on the way, within 30 mV at the clips of what the plan expects, and one reading was corrected', async () => {
    const { charges } = await read<BoardDto>('/api/board');
    let corrected = 0;
    for (const card of charges.filter(({ startedAt, title }) => startedAt !== null && title !== 'R-2406')) {
      const charge = await read<ChargeDto>(`/api/charges/${card.id}`);
      const valid = charge.readings.filter(({ replacedBy }) => replacedBy === null);
      expect(valid.length, card.title).toBeGreaterThan(0);
      corrected += charge.readings.length - valid.length;
      if (charge.expected)
        expect(Math.abs(charge.expected.terminalVolts - valid.at(-1)!.terminalVolts!), card.title).toBeLessThan(0.03);
      expect(charge.checks.every(({ answer }) => answer === 'yes')).toBe(true);
    }
    expect(corrected).toBe(1);
  });

  it('leave the queued one with checks to answer and a way to start it', async () => {
    const { charges } = await read<BoardDto>('/api/board');
    const queued = charges.find(({ stage }) => stage === 'queued')!;
    const charge = await read<ChargeDto>(`/api/charges/${queued.id}`);
    expect(charge.startBlockedBy).toContain('still to come');
    expect(charge.channelNames).toEqual(['B1']);
  });

  it('go on by the clock: an hour later the resting one asks for its check', async () => {
    const { charges } = await read<BoardDto>('/api/board');
    const due = charges.find(({ title }) => title === 'R-2412')!.checkDueAt!;
    expect(Date.parse(due) - testNow).toBeGreaterThan(20 * 60_000);
    expect(Date.parse(due) - testNow).toBeLessThan(60 * 60_000);
  });
});

describe('the repairs of the demo', () => {
  it('are one for each charge on the bench, each with a believable reading of 96 groups, one that is being proven and two that nobody has read', async () => {
    const { repairs, counts } = await read<RepairListDto>('/api/repairs');
    const { charges } = await read<BoardDto>('/api/board');
    const proving = repairs.filter(({ step }) => step === 'prove');
    expect(repairs.flatMap(({ charge }) => charge?.title ?? []).sort()).toEqual(
      charges.map(({ title }) => title).sort(),
    );
    const unread = repairs.filter(({ step }) => step === 'read');
    expect(unread.map(({ number }) => number)).toEqual(['R-2424', 'R-2425']);
    expect([proving.length, counts.open]).toEqual([1, charges.length + 3]);
    for (const { id, number, charge } of repairs.filter((one) => !unread.includes(one))) {
      const { readings, pack, failing, computed } = await read<RepairPageDto>(`/api/repairs/${id}`);
      const arrival = readings.at(-1)!;
      expect([arrival.stage, arrival.groupVolts.length, pack.groupCount], number).toEqual(['arrival', 96, 96]);
      expect(arrival.oddPositions, number).toEqual([failing]);
      expect(arrival.spreadMillivolts, number).toBeGreaterThan(70);
      expect(arrival.spreadMillivolts, number).toBeLessThan(115);
      // The charge brings its spare to what the healthy groups read.
      if (charge) expect(Math.abs(computed!.volts - charge.targetVolts), number).toBeLessThan(0.0005);
    }
  });

  it('have one whose sources disagree, and a spread log of 102, 38 and 11 mV on the one being proven', async () => {
    const { repairs } = await read<RepairListDto>('/api/repairs');
    const blocked = repairs.filter(({ block }) => block?.code === 'sources-disagree');
    expect(blocked.map(({ number, step, needsSomebody }) => [number, step, needsSomebody])).toEqual([
      ['R-2423', 'second-source', true],
    ]);
    expect(blocked[0]!.block!.text).toBe('The pack says module 11, your meter says 12.');
    const proving = repairs.find(({ step }) => step === 'prove')!;
    const page = await read<RepairPageDto>(`/api/repairs/${proving.id}`);
    expect(page.readings.map(({ spreadMillivolts }) => spreadMillivolts)).toEqual([11, 38, 102]);
    expect(page.readings.map(({ change }) => change?.kind)).toEqual(['balanced', 'exchange', undefined]);
    expect(page.removed).toMatchObject([{ fate: 'scrap' }]);
    expect(page.wait).toHaveLength(1);
    for (const reading of page.readings) expect(Date.parse(reading.at)).toBeLessThan(testNow);
  });

  it('wait by themselves from the target on: all that charge, but neither the ready one, the undecided one nor the unread ones', async () => {
    const { repairs, counts } = await read<RepairListDto>('/api/repairs');
    const still = repairs.filter(({ waits }) => !waits).map(({ number, step }) => [number, step]);
    expect(still.filter(([, step]) => step !== 'prove' && step !== 'read')).toEqual([
      ['R-2423', 'second-source'],
      ['R-2408', 'fit'],
    ]);
    expect(counts.waiting).toBe(counts.open - still.length);
    const ready = await read<RepairPageDto>(`/api/repairs/${repairs.find(({ number }) => number === 'R-2408')!.id}`);
    expect(ready.wait).toHaveLength(1);
    expect(ready.wait[0]!.to).toBe(ready.charge!.readyAt);
  });
});

describe('the workshop of the demo', () => {
  it('has people of each role under example.com, and an open invitation', async () => {
    const people = await read<PersonDto[]>('/api/people');
    expect(people.map(({ role }) => role).sort()).toEqual([
      'foreman',
      'manager',
      'technician',
      'technician',
      'technician',
      'technician',
    ]);
    for (const { email } of people) expect(email).toMatch(/@harbourlane\.example\.com$/);
    expect(await read<unknown[]>('/api/invitations')).toHaveLength(1);
  });

  it('has one paired wall, approved by its foreman and heard of within the last minute', async () => {
    const walls = await read<WallDto[]>('/api/walls', 'foreman');
    expect(walls).toEqual([
      expect.objectContaining({
        name: 'Bench wall',
        diagonalInches: 55,
        distanceMetres: 7,
        approvedBy: 'Hella Brandt',
      }),
    ]);
    expect(testNow - Date.parse(walls[0]!.lastHeardAt!)).toBeLessThan(60_000);
    expect(testNow - Date.parse(walls[0]!.createdAt)).toBeGreaterThan(86_400_000);
  });

  it('has no spare on the shelf whose reading a charge has made old', async () => {
    const spares = await read<SpareDto[]>('/api/spares');
    const moved = spares.filter(({ where, reading }) => where !== 'charge' && reading?.movedBy != null);
    expect(moved.map(({ label }) => label)).toEqual([]);
  });

  it('has six chargers, four module types over three chemistries and 30 spares, two of them in quarantine', async () => {
    const chargers = await read<ChargerDto[]>('/api/chargers');
    expect(chargers.flatMap(({ channels }) => channels.map(({ name }) => name)).sort()).toEqual([
      'A1',
      'A2',
      'B1',
      'B2',
      'C1',
      'C2',
    ]);
    expect(chargers).toHaveLength(6);
    const types = await read<ModuleTypeDto[]>('/api/module-types');
    expect(new Set(types.map(({ chemistry }) => chemistry)).size).toBe(3);
    expect(types).toHaveLength(4);
    const spares = await read<SpareDto[]>('/api/spares');
    const where = (place: string) => spares.filter((spare) => spare.where === place).length;
    expect([spares.length, where('charge'), where('quarantine')]).toEqual([30, 10, 2]);
    expect(types.reduce((sum, { spareCount }) => sum + spareCount, 0)).toBeGreaterThan(200);
  });

  it('keeps a random password each in a file of the data folder that only its owner reads, and one signs in', async () => {
    const file = passwordsFile(dataDir);
    expect(fs.statSync(file).mode & 0o777).toBe(0o600);
    const lines = fs.readFileSync(file, 'utf8').match(/^\S+@\S+ {2}\S+/gm)!;
    expect(new Set(lines.map((line) => line.split(/\s+/)[1])).size).toBe(6);
    const [email, password] = lines[0]!.split(/\s+/);
    await server.anyone.post('/api/session', { email, password }).expect(200);
    await server.anyone.post('/api/session', { email, password: `${password}x` }).expect(401);
  });
});

describe('the past of the demo', () => {
  it('fills eight weeks with 200 to 260 charges on every type and charger, most of them inside their band', async () => {
    const waits = await read<WaitsDto>('/api/waits', 'foreman');
    expect(waits.charges).toBeGreaterThan(200);
    expect(waits.charges).toBeLessThan(260);
    expect(waits.weeks.slice(0, 8).every(({ charges }) => charges > 15)).toBe(true);
    expect(waits.byModuleType).toHaveLength(4);
    expect((await read<WaitGroupsDto>('/api/waits/groups?by=charger', 'foreman')).groups).toHaveLength(6);
    expect(waits.plan!.insideBand).toBeGreaterThan(0.65);
    expect(waits.plan!.insideBand).toBeLessThan(0.95);
    expect(waits.medianS / 3600).toBeGreaterThan(1.5);
    expect(waits.medianS / 3600).toBeLessThan(5);
    expect(waits.stages.map(({ stage }) => stage)).toEqual(['queue', 'charging', 'tapering', 'resting', 'check-due']);
  });

  it('used 10 to 60 % of its waits by other work in each of eight weeks, nobody in two things at once', async () => {
    const { weeks } = await read<WaitsDto>('/api/waits', 'foreman');
    for (const { usedHours, lostHours } of weeks.slice(0, 8)) {
      expect(usedHours / (usedHours + lostHours)).toBeGreaterThan(0.1);
      expect(usedHours / (usedHours + lostHours)).toBeLessThan(0.6);
    }
    const stints = await server.deps.dataSource.manager.find(WorkStint, { order: { personId: 'ASC', fromAt: 'ASC' } });
    const done = stints.filter(({ state }) => state === 'done');
    expect(done.length).toBeGreaterThan(50);
    done.forEach((stint, place) => {
      const before = done[place - 1];
      if (before?.personId === stint.personId) expect(stint.fromAt).toBeGreaterThanOrEqual(before.toAt);
    });
  });

  it('never has two charges on one channel at once', async () => {
    const holds = await server.deps.dataSource.manager.find(ChannelHold, {
      order: { channelId: 'ASC', fromAt: 'ASC' },
    });
    const taken = holds.filter(({ state }) => state !== 'reserved');
    expect(taken.length).toBeGreaterThan(200);
    taken.forEach((hold, place) => {
      const before = taken[place - 1];
      if (before?.channelId === hold.channelId) expect(hold.fromAt!).toBeGreaterThanOrEqual(before.toAt!);
    });
  });

  it('was fitted where its groups were within the tolerance, and topped up or begun again where not', async () => {
    const { manager } = server.deps.dataSource;
    const checks = new Map((await manager.find(RestCheck)).map((check) => [check.chargeId, check]));
    const charges = await manager.find(Charge, { select: { id: true, stage: true, topUpOf: true } });
    const topped = new Set(charges.map(({ topUpOf }) => topUpOf));
    for (const { id, stage } of charges) {
      if (stage === 'fitted') expect(checks.get(id)?.verdict.within).toBe(true);
      if (stage === 'shelved') expect([checks.get(id)?.verdict.within, topped.has(id)]).toEqual([false, true]);
    }
    for (const stage of ['fitted', 'shelved', 'stopped']) expect(charges.some((one) => one.stage === stage)).toBe(true);
  });

  it('shows a closed charge with its checks, readings, look-ins and log', async () => {
    const { items } = await closedPage();
    const charge = await read<ChargeDto>(`/api/charges/${items.find(({ stage }) => stage === 'fitted')!.id}`);
    expect(charge.checks.every(({ answer }) => answer === 'yes')).toBe(true);
    expect(charge.readings.length).toBeGreaterThan(0);
    expect(charge.restChecks).toHaveLength(1);
    expect(charge.events.map(({ kind }) => kind)).toEqual(
      expect.arrayContaining(['planned', 'started', 'resting', 'check-due', 'ready', 'fitted']),
    );
    expect(charge.deliveredAh).toBeGreaterThan(0.5);
    expect(charge.deliveredAh / charge.plannedAh).toBeCloseTo(1, 0);
  });

  async function closedPage(): Promise<{ items: { id: string; stage: string }[] }> {
    const body = await read<unknown>('/api/charges?closed=1');
    return Array.isArray(body) ? { items: body as { id: string; stage: string }[] } : (body as never);
  }
});

describe('seeding', () => {
  it('again changes nothing', async () => {
    const count = await server.deps.dataSource.manager.count(Charge);
    const told = server.hub.told.length;
    await seedDemo(server.deps);
    expect(await server.deps.dataSource.manager.count(Charge)).toBe(count);
    expect(server.hub.told).toHaveLength(told);
  });

  it('leaves a database alone that has a workshop', async () => {
    const used = await makeTestServer({ demo: true, config: { dataDir } });
    await seedDemo(used.deps);
    expect(await used.deps.dataSource.manager.countBy(Workshop, { id: demoWorkshopId })).toBe(0);
    await used.close();
  });
});
