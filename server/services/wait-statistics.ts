/** What the waits of charges add up to; pure, from rows that are already put together. */
import { quantile } from '@/calc/index';
import type { WaitGroupDto, WaitsDto, WaitStageDto, WaitWeekDto } from '@/shared/contract/waits';
import type { DayPeriod } from './wait-period';
import { mondayOf, weekNumberOf } from './wait-period';

/** One charge that became ready, epoch ms. */
export interface Wait {
  chargeId: string;
  title: string;
  typeId: string;
  typeName: string;
  chargerId: string;
  chargerName: string;
  /** When it was asked for: of a top-up, when the first charge of its row was. */
  askedAt: number;
  plannedAt: number;
  readyAt: number;
  earlyAt: number;
  likelyAt: number;
  lateAt: number;
  startedAt: number | null;
  taperAt: number | null;
  currentEndAt: number | null;
  checkDueAt: number | null;
  checkedAt: number | null;
}

export const waitSeconds = (wait: Wait): number => (wait.readyAt - wait.askedAt) / 1000;
/** Actual minus planned likely finish, s. */
export const againstPlanSeconds = (wait: Wait): number => (wait.readyAt - wait.likelyAt) / 1000;
export const isInsideBand = (wait: Wait): boolean => wait.readyAt >= wait.earlyAt && wait.readyAt <= wait.lateAt;

const median = (values: number[]): number => quantile(values, 0.5);
const share = (waits: readonly Wait[]): number => waits.filter(isInsideBand).length / waits.length;

/** All figures of a period; medians and 90th percentiles are quantiles of type 7. */
export function waitFigures(waits: readonly Wait[], period: DayPeriod, zone: string): Omit<WaitsDto, 'rows'> {
  const some = waits.length > 0;
  return {
    from: period.from,
    to: period.to,
    charges: waits.length,
    medianS: some ? median(waits.map(waitSeconds)) : null,
    p90S: some ? quantile(waits.map(waitSeconds), 0.9) : null,
    againstPlanS: some ? median(waits.map(againstPlanSeconds)) : null,
    insideBand: some ? share(waits) : null,
    weeks: weeks(waits, period, zone),
    byModuleType: groups(waits, (wait) => [wait.typeId, wait.typeName]),
    byCharger: groups(waits, (wait) => [wait.chargerId, wait.chargerName]),
    stages: stages(waits),
  };
}

/** Every week of the period, those without a charge too. */
function weeks(waits: readonly Wait[], period: DayPeriod, zone: string): WaitWeekDto[] {
  const byMonday = new Map<string, Wait[]>(period.mondays.map((monday) => [monday, []]));
  for (const wait of waits) byMonday.get(mondayOf(wait.readyAt, zone))?.push(wait);
  return [...byMonday].map(([monday, own]) => ({ monday, week: weekNumberOf(monday, zone), ...spread(own) }));
}

function spread(waits: readonly Wait[]): Pick<WaitWeekDto, 'charges' | 'waitHours' | 'medianS' | 'p90S'> {
  const seconds = waits.map(waitSeconds);
  return {
    charges: waits.length,
    waitHours: seconds.reduce((sum, value) => sum + value, 0) / 3600,
    medianS: waits.length > 0 ? median(seconds) : 0,
    p90S: waits.length > 0 ? quantile(seconds, 0.9) : 0,
  };
}

/** Most charges first. */
function groups(waits: readonly Wait[], keyOf: (wait: Wait) => [key: string, name: string]): WaitGroupDto[] {
  const byKey = new Map<string, { name: string; waits: Wait[] }>();
  for (const wait of waits) {
    const [key, name] = keyOf(wait);
    const group = byKey.get(key) ?? { name, waits: [] };
    group.waits.push(wait);
    byKey.set(key, group);
  }
  return [...byKey]
    .map(([key, group]) => ({
      key,
      name: group.name,
      ...spread(group.waits),
      againstPlanS: median(group.waits.map(againstPlanSeconds)),
      insideBand: share(group.waits),
    }))
    .sort((a, b) => b.charges - a.charges || a.name.localeCompare(b.name));
}

/** The middle length of each stage over the charges that had it; a stage that none had is left out. */
function stages(waits: readonly Wait[]): WaitStageDto[] {
  const spans: [WaitStageDto['stage'], (wait: Wait) => [number | null, number | null]][] = [
    ['queue', (wait) => [wait.plannedAt, wait.startedAt]],
    ['charging', (wait) => [wait.startedAt, wait.taperAt ?? wait.currentEndAt]],
    ['tapering', (wait) => [wait.taperAt, wait.currentEndAt]],
    ['resting', (wait) => [wait.currentEndAt, wait.checkDueAt]],
    ['check-due', (wait) => [wait.checkDueAt, wait.checkedAt ?? wait.readyAt]],
  ];
  return spans.flatMap(([stage, spanOf]) => {
    const lengths = waits.flatMap((wait) => {
      const [from, to] = spanOf(wait);
      return from === null || to === null ? [] : [Math.max(0, (to - from) / 1000)];
    });
    return lengths.length === 0 ? [] : [{ stage, medianS: median(lengths) }];
  });
}
