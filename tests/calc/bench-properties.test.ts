import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  CalcInputError,
  earliestDueFirst,
  planBench,
  planFills,
  type BenchProblem,
  type BenchSolution,
  type FillProblem,
  type FillSolution,
  type Stretch,
} from '@/calc/index';
import { always, benchJob, benchProblem, fillProblem, fillWork } from './bench-fixtures';

const QUICK = { maxNodes: 3000 };
const overlap = (one: Stretch, other: Stretch) => one.fromS < other.toS - 1e-6 && other.fromS < one.toS - 1e-6;
const apart = (list: Stretch[]) => list.every((one, at) => list.slice(at + 1).every((other) => !overlap(one, other)));

/** Ascending stretches apart from each other, from pauses and lengths. */
const stretches = (most: number) =>
  fc
    .array(fc.tuple(fc.integer({ min: 1, max: 9000 }), fc.integer({ min: 1, max: 20_000 })), { maxLength: most })
    .map((list) => {
      let at = -5000;
      return list.map(([pause, length]): Stretch => {
        const fromS = at + pause;
        at = fromS + length;
        return { fromS, toS: at };
      });
    });

const alternative = (channels: number) =>
  fc.record({
    channels: fc.uniqueArray(fc.integer({ min: 0, max: channels - 1 }), { minLength: 1, maxLength: 2 }),
    busyS: fc.integer({ min: 600, max: 20_000 }),
    readyS: fc.integer({ min: 0, max: 25_000 }),
    guardS: fc.integer({ min: 0, max: 30_000 }),
    mayStart: fc.oneof(fc.constant(always), stretches(3)),
  });

const problems: fc.Arbitrary<BenchProblem> = fc.integer({ min: 1, max: 4 }).chain((channels) =>
  fc.record({
    taken: fc.array(stretches(2), { minLength: channels, maxLength: channels }),
    jobs: fc
      .array(
        fc.record({
          dueS: fc.option(fc.integer({ min: -5000, max: 60_000 })),
          weight: fc.integer({ min: 0, max: 5 }),
          alternatives: fc.array(alternative(channels), { maxLength: 3 }),
        }),
        { maxLength: 16 },
      )
      .map((list) => list.map((job, at) => ({ id: `${at}`, ...job }))),
  }),
);

/** Everything a plan must keep, read from its placements alone. */
function expectKept({ taken, jobs }: BenchProblem, plan: BenchSolution): void {
  const held: Stretch[][] = taken.map(() => []);
  let late = 0;
  let makespan = 0;
  for (const { jobId, alternative: at, startS } of plan.placements) {
    const { alternatives, dueS, weight } = jobs.find(({ id }) => id === jobId)!;
    const { channels, busyS, readyS, guardS, mayStart } = alternatives[at]!;
    expect(startS).toBeGreaterThanOrEqual(0);
    expect(mayStart.some(({ fromS, toS }) => fromS <= startS && startS <= toS)).toBe(true);
    for (const channel of channels) {
      const mine = { fromS: startS, toS: startS + busyS };
      expect(taken[channel]!.some((one) => overlap(one, mine))).toBe(false);
      held[channel]!.push(mine);
    }
    if (dueS !== null) late += weight * Math.max(0, startS + guardS - dueS);
    makespan = Math.max(makespan, startS + readyS);
  }
  for (const list of held) expect(apart(list)).toBe(true);
  expect([...plan.placements.map(({ jobId }) => jobId), ...plan.unplaced].sort()).toEqual(
    jobs.map(({ id }) => id).sort(),
  );
  expect(plan.weightedTardinessS).toBeCloseTo(late, 4);
  expect(plan.makespanS).toBe(makespan);
  expect(plan.boundS).toBeLessThanOrEqual(plan.weightedTardinessS + 1e-6);
}

describe('whatever the charges, a plan of channels', () => {
  it('has no channel with two charges, keeps what is taken, starts in time, loses nobody, and says what it comes to, over 300 workshops', () => {
    fc.assert(
      fc.property(problems, (problem) => {
        expectKept(problem, planBench(problem, QUICK));
        expectKept(problem, earliestDueFirst(problem));
      }),
      { numRuns: 300 },
    );
  });

  it('is never worse than earliest due first, over 300 workshops, after however few nodes', () => {
    fc.assert(
      fc.property(problems, fc.constantFrom(0, 1, 50, 3000), (problem, maxNodes) => {
        const [plan, list] = [planBench(problem, { maxNodes }), earliestDueFirst(problem)];
        expect(plan.unplaced.length).toBeLessThanOrEqual(list.unplaced.length);
        if (plan.unplaced.length < list.unplaced.length) return;
        expect(plan.weightedTardinessS).toBeLessThanOrEqual(list.weightedTardinessS + 1e-6);
        if (plan.weightedTardinessS > list.weightedTardinessS - 1e-6)
          expect(plan.makespanS).toBeLessThanOrEqual(list.makespanS + 1e-6);
      }),
      { numRuns: 300 },
    );
  });

  it('has a bound that the proved best of the same workshop is never under, over 100 of up to 6 charges', () => {
    const small = problems.map(({ taken, jobs }) => ({ taken, jobs: jobs.slice(0, 6) }));
    fc.assert(
      fc.property(small, (problem) => {
        const [best, cut] = [planBench(problem), planBench(problem, { maxNodes: 300 })];
        expect(best.proved).toBe(true);
        if (cut.unplaced.length === best.unplaced.length)
          expect(cut.boundS).toBeLessThanOrEqual(best.weightedTardinessS + 1e-6);
      }),
      { numRuns: 100 },
    );
  });

  it('ends when it is told to stop, with a plan of all 20', () => {
    const jobs = Array.from({ length: 20 }, (_, at) => benchJob(`${at}`, 1000 + at, 2, { dueS: 3000 }));
    let asked = 0;
    const plan = planBench(benchProblem(2, jobs), { maxNodes: Infinity, shouldStop: () => (asked += 1) > 5 });
    expect(plan.placements.length).toBe(20);
    expect(asked).toBe(6);
  });

  it('is refused for a job twice, a channel that is not there, a charge without length and stretches that overlap', () => {
    const job = benchJob('1', 100, 1);
    const changed = (over: object) => ({ ...job, alternatives: [{ ...job.alternatives[0]!, ...over }] });
    const crossing = [
      { fromS: 0, toS: 9 },
      { fromS: 5, toS: 12 },
    ];
    expect(() => planBench(benchProblem(1, [job, job]))).toThrow('jobs[1].id');
    expect(() => planBench(benchProblem(1, [changed({ channels: [1] })]))).toThrow('channels');
    expect(() => planBench(benchProblem(1, [changed({ busyS: 0 })]))).toThrow(CalcInputError);
    expect(() => planBench({ taken: [crossing], jobs: [job] })).toThrow('taken[0][1].fromS');
  });
});

const days: fc.Arbitrary<FillProblem> = fc.record({
  windows: fc
    .array(fc.tuple(stretches(3), fc.array(fc.integer({ min: -5000, max: 40_000 }), { maxLength: 6 })), {
      maxLength: 4,
    })
    .map((people) =>
      people.flatMap(([list, looks], at) =>
        list.map((one) => ({
          personId: `p${at}`,
          ...one,
          lookInsS: looks.filter((look) => one.fromS <= look && look < one.toS),
        })),
      ),
    ),
  work: fc
    .array(
      fc.record({
        likelyS: fc.integer({ min: 0, max: 6000 }),
        longS: fc.integer({ min: 300, max: 9000 }),
        weight: fc.integer({ min: 0, max: 4 }),
        personIds: fc.subarray(['p0', 'p1', 'p2', 'p3']),
        placeId: fc.option(fc.constantFrom('bay', 'bench')),
        releaseS: fc.integer({ min: -1000, max: 15_000 }),
        dueS: fc.option(fc.integer({ min: 0, max: 40_000 })),
        splittable: fc.boolean(),
        leastPartS: fc.integer({ min: 0, max: 3000 }),
      }),
      { maxLength: 10 },
    )
    .map((list) => list.map((one, at) => ({ id: `${at}`, ...one }))),
  placesTaken: fc.record({ bay: stretches(2) }),
  lookInS: fc.constantFrom(0, 60, 300),
});

/** Everything a day of fills must keep, read from its placements alone. */
function expectDayKept({ windows, work, placesTaken, lookInS }: FillProblem, plan: FillSolution): void {
  const ofPerson = new Map<string, Stretch[]>();
  const atPlace = new Map<string, Stretch[]>(Object.entries(placesTaken).map(([id, list]) => [id, [...list]]));
  let worth = 0;
  for (const one of plan.placements) {
    const window = windows[one.window]!;
    const piece = work.find(({ id }) => id === one.workId)!;
    expect(window.personId).toBe(one.personId);
    expect(piece.personIds).toContain(one.personId);
    expect(one.fromS).toBeGreaterThanOrEqual(Math.max(window.fromS, piece.releaseS, 0));
    expect(one.toS).toBeLessThanOrEqual(Math.min(window.toS, piece.dueS ?? Infinity));
    // Every look-in that falls into it, none before, makes it as much longer.
    const looks = window.lookInsS.filter((at) => one.fromS <= at && at < one.toS).length;
    expect(one.toS - one.fromS).toBeCloseTo(one.workedS + looks * lookInS, 4);
    // It neither begins nor ends while its person looks in.
    let over = -Infinity;
    for (const at of [...window.lookInsS].sort((a, b) => a - b)) {
      const begins = Math.max(at, over);
      over = begins + lookInS;
      const cuts = (instant: number) => begins + 1e-6 < instant && instant < over - 1e-6;
      expect(cuts(one.fromS) || cuts(one.toS)).toBe(false);
    }
    ofPerson.set(one.personId, [...(ofPerson.get(one.personId) ?? []), one]);
    if (piece.placeId !== null) atPlace.set(piece.placeId, [...(atPlace.get(piece.placeId) ?? []), one]);
    worth += (piece.weight * piece.likelyS * one.workedS) / piece.longS / 60;
  }
  for (const list of ofPerson.values()) expect(apart(list)).toBe(true);
  for (const list of atPlace.values()) expect(apart(list)).toBe(true);
  for (const { id, longS, splittable, leastPartS } of work) {
    const parts = plan.placements.filter(({ workId }) => workId === id);
    expect(apart(parts)).toBe(true);
    expect(parts.reduce((sum, { workedS }) => sum + workedS, 0)).toBeLessThanOrEqual(longS + 1e-6);
    const least = splittable ? Math.min(leastPartS, longS) : longS;
    for (const { workedS } of parts) expect(workedS).toBeGreaterThanOrEqual(least - 1e-6);
  }
  expect(plan.weightedMinutes).toBeCloseTo(worth, 4);
  expect(plan.bound).toBeGreaterThanOrEqual(plan.weightedMinutes - 1e-6);
}

describe('whatever the other work, a plan of fills', () => {
  it('has nobody and no piece in two places, no place twice, keeps windows, releases, due times, look-ins and least parts, over 400 days', () => {
    fc.assert(
      fc.property(days, (day) => expectDayKept(day, planFills(day, { maxNodes: 200 }))),
      { numRuns: 400 },
    );
  });

  it('lengthens a fill by the look-ins in it, and leaves it out where it does not fit with them', () => {
    const work = [fillWork('1', { longS: 1800 })];
    const windows = [{ personId: 'A', fromS: 0, toS: 2000, lookInsS: [600] }];
    const [fill] = planFills(fillProblem(0, work, { windows })).placements;
    expect(fill).toMatchObject({ fromS: 0, toS: 1920, workedS: 1800 });
    expect(planFills(fillProblem(0, work, { windows, lookInS: 201 })).placements).toEqual([]);
  });

  it('counts a part of 20 of 30 long minutes as two thirds of the likely ones, and leaves no remainder under the least part', () => {
    const half = [fillWork('1', { splittable: true, likelyS: 1200, longS: 1800, leastPartS: 600 })];
    expect(planFills(fillProblem(1200, half)).weightedMinutes).toBeCloseTo((20 * 2) / 3, 6);
    const windows = [
      { personId: 'A', fromS: 0, toS: 1500, lookInsS: [] },
      { personId: 'A', fromS: 2000, toS: 2700, lookInsS: [] },
    ];
    const worked = planFills(fillProblem(0, half, { windows })).placements.map(({ workedS }) => workedS);
    expect(worked).toEqual([1200, 600]);
  });

  it('gives nothing at all to a day without windows, and ends when told to stop', () => {
    expect(planFills({ windows: [], work: [fillWork('1')], placesTaken: {}, lookInS: 60 }).placements).toEqual([]);
    const work = Array.from({ length: 30 }, (_, at) => fillWork(`${at}`, { longS: 700 + 37 * at, placeId: 'bay' }));
    let asked = 0;
    planFills(fillProblem(9000, work), { maxNodes: Infinity, shouldStop: () => (asked += 1) > 3 });
    expect(asked).toBe(4);
  });

  it('is refused where one person has two windows at a time', () => {
    const windows = [0, 100].map((fromS) => ({ personId: 'A', fromS, toS: fromS + 200, lookInsS: [] }));
    expect(() => planFills(fillProblem(0, [], { windows }))).toThrow('windows[1].fromS');
  });
});
