/** Other work that was done in the waits of eight weeks: taken and ended through the services, at instants of the past. */
import { DateTime } from 'luxon';
import { IsNull, Not } from 'typeorm';
import type { Deps } from '../deps';
import { Charge } from '../entities/charge';
import { earliestBegin, type Stretch } from '../services/bench-plan/spans';
import { endStint } from '../services/stints.service';
import { takeWork } from '../services/take-work.service';
import { addWork } from '../services/work.service';
import { demoWorkshopId } from './demo-workshop';
import { makeNoise, type Noise } from './noise';
import { demoPeople, memberOf, type DemoName } from './people';

const MINUTE = 60_000;
const SEED = 41;
/** Clips on and first looks before a charge can be left alone, and hands back before its check, ms. */
const BEGUN_MS = 10 * MINUTE;
const BACK_MS = 10 * MINUTE;
/** A fill is worth beginning from here on, and nobody is away from the bench for longer, min. */
const [SHORTEST, USUAL, LONGEST] = [40, 90, 200];
/** Of the waits, how many are left unused in the first week; every week it is fewer by the other. */
const [UNUSED, LESS] = [0.5, 0.055];
/** What was thought at the longest, of what it then took. */
const LONG_SHARE = 1.25;

/** What always is to be done, a week's worth for each person. */
const standing: Record<'ines' | 'bram' | 'suri' | 'marek', string[]> = {
  ines: ['Read the spares of rack 1', 'Strip packs for their spares', 'Gauge the busbars in stock'],
  bram: ['Services of the pool vehicles', 'Leak checks of cooling plates', 'Refit lids and seals'],
  suri: ['Winter and summer wheels', 'Label and shelve new spares', 'Crimp sense leads'],
  marek: ['Brake inspections', 'Cabin filters and fluids', 'Bring the lift logs up to date'],
};
type Doer = keyof typeof standing;

interface Fill {
  from: number;
  minutes: number;
}

/**
 * Lets the technicians take other work in the waits of the charges that are over, one stretch a day where there is one.
 * Not every wait is used; from week to week it is more of them, as people find out that the plan can be trusted.
 */
export async function livePastWork(deps: Deps, zone: string): Promise<void> {
  const noise = makeNoise(SEED);
  const charges = await deps.dataSource.manager.find(Charge, {
    where: { workshopId: demoWorkshopId, closedAt: Not(IsNull()) },
    order: { createdAt: 'ASC' },
  });
  const weeks = new Map<string, Map<Doer, Fill[]>>();
  for (const [day, ofDay] of parted(charges, ({ startedAt, createdAt }) => midnight(startedAt ?? createdAt, zone)))
    for (const name of Object.keys(standing) as Doer[]) {
      const own = ({ personId }: Charge): boolean => personId === demoPeople[name].id;
      const fill = fillOf(ofDay.filter(own), charges.filter(own), DateTime.fromMillis(day, { zone }), noise);
      const monday = DateTime.fromMillis(day, { zone }).startOf('week').toISODate()!;
      const before = [...weeks.keys()].filter((one) => one < monday).length;
      if (fill === null || noise.chance(UNUSED - LESS * before)) continue;
      const week = weeks.get(monday) ?? new Map<Doer, Fill[]>();
      weeks.set(monday, week.set(name, [...(week.get(name) ?? []), fill]));
    }
  let place = 0;
  for (const [monday, ofPeople] of weeks) {
    for (const [name, fills] of ofPeople)
      await liveWeek(
        deps,
        name,
        standing[name][place % standing[name].length]!,
        DateTime.fromISO(monday, { zone }),
        fills,
      );
    place += 1;
  }
}

/** One piece of work for the week, planned on the Thursday before it, done in parts. */
async function liveWeek(
  deps: Deps,
  name: Doer,
  title: string,
  monday: DateTime,
  fills: readonly Fill[],
): Promise<void> {
  const member = memberOf(name);
  const plannedAt = monday.minus({ days: 4 }).set({ hour: 16 }).toMillis();
  const long = ({ minutes }: Fill): number => Math.round(minutes * LONG_SHARE);
  const sum = (of: (fill: Fill) => number): number => fills.reduce((all, fill) => all + of(fill), 0);
  const planner: DemoName = 'hella';
  const { id } = await addWork(
    deps,
    memberOf(planner),
    {
      ...{ title, likelyMinutes: sum(({ minutes }) => minutes), longMinutes: sum(long), skillId: null, placeId: null },
      ...{ priority: 'usual', dueAt: null, repairId: null, splittable: fills.length > 1, note: null },
    },
    plannedAt,
  );
  for (const fill of fills) {
    const taken = await takeWork(deps, member, id, fills.length > 1 ? { minutes: long(fill) } : {}, fill.from);
    const stint = taken.stints.find(({ state }) => state === 'taken')!;
    await endStint(deps, member, id, stint.id, {}, fill.from + fill.minutes * MINUTE);
  }
}

/** The first stretch of a person's day in which a charge of theirs runs or rests and nothing else is in their hands. */
function fillOf(charges: readonly Charge[], all: readonly Charge[], day: DateTime, noise: Noise): Fill | null {
  const at = (hour: number, minute: number): number => day.set({ hour, minute }).toMillis();
  const busy: Stretch[] = [
    { from: at(9, 45), to: at(10, 0) },
    { from: at(12, 30), to: at(13, 0) },
    ...all.flatMap(({ createdAt, startedAt, checkedAt, readyAt }): Stretch[] => [
      { from: createdAt, to: createdAt + BEGUN_MS },
      ...(startedAt === null ? [] : [{ from: startedAt - BACK_MS, to: startedAt + BEGUN_MS }]),
      ...(checkedAt === null ? [] : [{ from: checkedAt - BACK_MS, to: (readyAt ?? checkedAt) + BEGUN_MS }]),
    ]),
  ];
  const waits = charges.flatMap(({ startedAt, checkDueAt, currentEndAt }): Stretch[] => {
    const until = Math.min(checkDueAt ?? currentEndAt ?? 0, at(18, 0)) - BACK_MS;
    return startedAt === null || until <= startedAt ? [] : [{ from: startedAt + BEGUN_MS, to: until }];
  });
  const minutes = Math.round(noise.between(USUAL, LONGEST) / 5) * 5;
  for (let tried = minutes; tried >= SHORTEST; tried -= 15) {
    const ms = tried * MINUTE;
    const begins = waits.map(({ from, to }) => ({ from, to: to - ms })).filter(({ from, to }) => to >= from);
    const from = earliestBegin(begins, busy, ms, at(7, 30));
    if (from !== null) return { from, minutes: tried };
  }
  return null;
}

const midnight = (at: number, zone: string): number => DateTime.fromMillis(at, { zone }).startOf('day').toMillis();

function parted<T>(all: readonly T[], keyOf: (one: T) => number): Map<number, T[]> {
  const parts = new Map<number, T[]>();
  for (const one of all) parts.set(keyOf(one), [...(parts.get(keyOf(one)) ?? []), one]);
  return parts;
}
