import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { demoWorkshopId } from '@/server/demo/demo-workshop';
import { demoZone } from '@/server/demo/hours';
import { seedDemo } from '@/server/demo/seed';
import { Work } from '@/server/entities/work';
import { WorkStint } from '@/server/entities/work-stint';
import { daysOf } from '@/server/services/bench-plan/days';
import { loadGround } from '@/server/services/bench-plan/ground';
import { linesOf } from '@/server/services/bench-plan/people-lines';
import { overlaps } from '@/server/services/bench-plan/spans';
import type { FitsDto, StartNowDto } from '@/shared/contract/bench-plan';
import type { StaffingListDto } from '@/shared/contract/staffing';
import type { WorkListDto } from '@/shared/contract/work';
import { cookiesOf } from '../../support/cookies';
import { makeAgent, makeTestServer, testNow, type TestAgent, type TestServer } from '../../support/server';

let dataDir: string;
let server: TestServer;
let foreman: TestAgent;
beforeEach(() => (dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-demo-'))));
afterEach(async () => {
  await server.close();
  fs.rmSync(dataDir, { recursive: true, force: true });
});

async function seeded(now: number): Promise<void> {
  server = await makeTestServer({ empty: true, demo: true, now, config: { dataDir } });
  await seedDemo(server.deps);
  const signedIn = await server.anyone.post('/api/demo/sign-in', { role: 'foreman' }).expect(200);
  foreman = makeAgent(server.app, () => `bidewell_access=${cookiesOf(signedIn).bidewell_access!.value}`);
}
const read = async <Dto>(address: string): Promise<Dto> => (await foreman.get(address).expect(200)).body as Dto;

/** In Amsterdam: Tuesday 10:00, within the lunch of Tuesday, shortly before midnight, Saturday evening, and the night on Sunday whose clock jumps. */
const instants = [
  testNow,
  Date.parse('2026-06-09T10:40:00Z'),
  Date.parse('2026-06-09T21:50:00Z'),
  Date.parse('2026-06-13T19:00:00Z'),
  Date.parse('2026-03-29T01:30:00Z'),
];

describe.each(instants.map((now) => [new Date(now).toISOString(), now] as const))(
  'the demo made at %s',
  (_iso, now) => {
    it('has work that is open, taken, begun and done, and nobody with two things in hand at once', async () => {
      await seeded(now);
      const open = await read<WorkListDto>('/api/work');
      const over = await read<WorkListDto>('/api/work?state=over');
      expect(open.counts.taken).toBeGreaterThanOrEqual(2);
      expect(open.counts.begun).toBe(1);
      expect(open.counts.open).toBeGreaterThanOrEqual(6);
      expect(over.work.map(({ state }) => state).filter((state) => state === 'done').length).toBeGreaterThanOrEqual(1);
      expect(over.work.map(({ state }) => state)).toContain('dropped');
      const { manager } = server.deps.dataSource;
      const all = [...open.work, ...over.work];
      // A page of what is over is its newest 50, and what is on the bench now is among them.
      const eightWeeks = (await manager.find(Work)).filter(({ createdAt }) => createdAt < now - 95 * 3_600_000).length;
      expect(open.work.length + over.counts.over - eightWeeks).toBe(14);
      // Numbered as they were added, none before the repair that it is for.
      const added = [...all].sort((one, other) => one.number.localeCompare(other.number));
      expect(added.map(({ createdAt }) => createdAt)).toEqual(added.map(({ createdAt }) => createdAt).sort());

      const ground = await loadGround(manager, demoWorkshopId, daysOf(demoZone(), undefined, 1, now), now);
      let checked = 0;
      for (const { person, hands, stints } of linesOf(ground).lines) {
        const things = [
          ...stints.map(({ stint, span }) => ({ ...span, what: `stint ${stint.state}` })),
          ...hands.map(({ from, to, title }) => ({ from, to, what: title })),
        ];
        for (const { stint, span } of stints)
          for (const other of things.filter(
            ({ what, from }) => !(what === `stint ${stint.state}` && from === span.from),
          )) {
            checked += 1;
            expect(overlaps(span, other), `${person.name}: ${stint.state} and ${other.what}`).toBe(false);
          }
      }
      expect(checked).toBeGreaterThan(10);
      for (const { begunAt, endedAt } of await manager.find(WorkStint))
        for (const instant of [begunAt, endedAt]) expect(instant ?? now).toBeLessThanOrEqual(now);
    });
  },
);

describe('the bench plan of the demo', () => {
  it('knows six people, four skills and six places, and has waits that other work fits into', async () => {
    await seeded(testNow);
    const { people, skills, places } = await read<StaffingListDto>('/api/staffing');
    expect([people.length, skills.length, places.length]).toEqual([6, 4, 6]);
    expect(skills.every(({ people: able }) => able >= 2)).toBe(true);
    const fits = await read<FitsDto>('/api/bench-plan/fits');
    const fitting = fits.people.filter(({ stretches }) =>
      stretches.some((one) => one.waitOf !== null && one.fits.some(({ span }) => span !== null)),
    );
    expect(fitting.length).toBeGreaterThanOrEqual(3);
  });

  it('has two booked repairs that can be started now: one by its typed voltage, one by what has arrived', async () => {
    await seeded(testNow);
    const found = await read<StartNowDto[]>('/api/bench-plan/start-now');
    expect(found.map(({ number, arrivals }) => [number, arrivals > 0])).toEqual([
      ['R-2424', false],
      ['R-2425', true],
    ]);
    for (const { savesS } of found) expect(savesS).toBeGreaterThan(600);
  });
});
