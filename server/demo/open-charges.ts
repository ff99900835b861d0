/** The open charges of the demo: one in every stage, each lived through from its plan up to now. */
import type { Deps } from '../deps';
import { makeBenchDay, type BenchDay } from './bench-day';
import { actsOf, begin, courseOf, requestOf, switchOff, visits, type Wish } from './wish';

const MINUTE = 60_000;

export async function liveOpenCharges(deps: Deps, now: number): Promise<void> {
  const day = makeBenchDay(deps);
  await overdue(day, now);
  await checkDue(day, now);
  await resting(day, now);
  await charging(day, now);
  await tapering(day, now);
  await discharging(day, now);
  await ready(day, now);
  held(day, now);
  queued(day, now);
  planned(day, now);
  await day.live(now);
}

/** Interrupted for so long that its promise is past: nobody has taken the alert. */
async function overdue(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2406',
    position: '4',
    spare: 'S-0371',
    target: 3.912,
    way: 'terminals',
    finish: 'on-the-mark',
    channel: 'B2',
    by: 'bram',
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - 20 * MINUTE - course.lateMs;
  const acts = actsOf(day, wish);
  day.plan(
    [
      ...begin(acts, wish, start, now),
      acts.read(start + 31 * MINUTE),
      acts.hold(start + 35 * MINUTE, 'The breaker of bench 2 has tripped'),
      acts.read(now - 28 * MINUTE),
    ],
    {
      charge: wish.repair,
      // Switched on again so late that half an hour of current is left now.
      react: ({ charge }, at) =>
        charge.stage === 'held' && charge.currentEndAt !== null
          ? acts.resume(now + 30 * MINUTE - (charge.currentEndAt - at))
          : null,
    },
  );
}

async function checkDue(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2409',
    position: '12',
    spare: 'S-0402',
    target: 3.964,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'A1',
    by: 'ines',
    readyByMin: 198,
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - 8 * MINUTE - course.checkDueMs;
  const acts = actsOf(day, wish);
  day.plan([...begin(acts, wish, start, now), ...visits(acts, start, start + course.endMs)], {
    charge: wish.repair,
    react: switchOff(acts),
  });
}

async function resting(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2412',
    position: '9',
    spare: 'S-0420',
    target: 3.941,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'B1',
    by: 'bram',
    readyByMin: 258,
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - 22 * MINUTE - course.endMs;
  const acts = actsOf(day, wish);
  day.plan([...begin(acts, wish, start, now), acts.read(start + 12 * MINUTE), acts.pass(start + 15 * MINUTE, 'suri')], {
    charge: wish.repair,
    react: switchOff(actsOf(day, { ...wish, by: 'suri' })),
  });
}

async function charging(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2411',
    position: '6',
    spare: 'S-0398',
    target: 3.905,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'A2',
    by: 'ines',
    readyByMin: 258,
  };
  const course = await courseOf(day.deps, wish, now);
  // A look-in is due in eight minutes.
  const start = now - Math.min(112, Math.floor((course.endMs * 0.8) / MINUTE)) * MINUTE;
  const acts = actsOf(day, wish);
  day.plan([
    ...begin(acts, wish, start, now),
    acts.read(start + 24 * MINUTE, 'slip'),
    acts.correct(start + 29 * MINUTE),
    ...visits(acts, start, now - 5 * MINUTE),
  ]);
}

async function tapering(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2413',
    position: '3',
    spare: 'S-0381',
    target: 3.978,
    way: 'terminals',
    finish: 'on-the-mark',
    channel: 'A1',
    by: 'suri',
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - Math.round(course.taperMs + 0.45 * (course.endMs - course.taperMs));
  const acts = actsOf(day, wish);
  day.plan([...begin(acts, wish, start, now), acts.read(start + 8 * MINUTE)]);
}

async function discharging(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2415',
    position: '14',
    spare: 'S-0388',
    target: 3.87,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'C2',
    by: 'marek',
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - Math.min(37 * MINUTE, Math.round(course.endMs * 0.6));
  const acts = actsOf(day, wish);
  day.plan([...begin(acts, wish, start, now), acts.read(start + 20 * MINUTE)]);
}

async function ready(day: BenchDay, now: number): Promise<void> {
  const wish: Wish = {
    repair: 'R-2408',
    position: '9',
    spare: 'S-0424',
    target: 3.957,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'C1',
    by: 'bram',
    readyByMin: 258,
  };
  const course = await courseOf(day.deps, wish, now);
  const start = now - 15 * MINUTE - course.checkDueMs;
  const acts = actsOf(day, wish);
  const off = switchOff(acts);
  day.plan([...begin(acts, wish, start, now), acts.read(start + 15 * MINUTE)], {
    charge: wish.repair,
    react: (file, at) => {
      const due = file.charge.stage === 'check-due' ? file.charge.checkDueAt : null;
      return due === null ? off(file, at) : acts.check(Math.max(at, due + 4 * MINUTE));
    },
  });
}

function held(day: BenchDay, now: number): void {
  const wish: Wish = {
    repair: 'R-2417',
    position: '2',
    spare: 'S-0411',
    target: 3.955,
    way: 'paralleled',
    finish: 'over-and-settle',
    channel: 'C1',
    by: 'marek',
  };
  const start = now - 42 * MINUTE;
  const acts = actsOf(day, wish);
  day.plan([
    ...begin(acts, wish, start, now),
    acts.read(start + 16 * MINUTE),
    acts.hold(now - 17 * MINUTE, 'The leads were warm at the clips: being changed'),
  ]);
}

function queued(day: BenchDay, now: number): void {
  const wish: Wish = {
    repair: 'R-2418',
    position: '17',
    spare: 'S-0417',
    target: 3.968,
    way: 'terminals',
    finish: 'over-and-settle',
    channel: 'B1',
    by: 'ines',
    readyByMin: 273,
    clipOnMin: 18,
  };
  const acts = actsOf(day, wish);
  const at = now - 11 * MINUTE;
  day.plan([
    acts.keep(at, requestOf(wish, now)),
    acts.queue(at + 2 * MINUTE, now + 18 * MINUTE),
    acts.answer(at + 6 * MINUTE, 2),
  ]);
}

function planned(day: BenchDay, now: number): void {
  const wish: Wish = {
    repair: 'R-2423',
    position: '11',
    spare: 'S-0425',
    target: 3.972,
    way: 'terminals',
    finish: 'on-the-mark',
    channel: 'B1',
    by: 'suri',
    clipOnMin: 75,
  };
  day.plan([actsOf(day, wish).keep(now - 6 * MINUTE, requestOf(wish, now))]);
}
