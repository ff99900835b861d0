/** The one time axis under all lanes of the bench plan. Instants are epoch ms, places px. */
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import { instantOfDay } from '../format/zone';
import { clockTicks, tickAnchor, type Tick } from '../wait-ribbon/ticks';
import type { LocaleMarks } from '../format/marks';

export interface PlanAxis {
  from: number;
  to: number;
  /** px */
  width: number;
}

const hourMs = 3_600_000;
const halfHourMs = hourMs / 2;
/** A charge that runs through the night does not squeeze the day: its lane ends this long after the work does. */
const beyondWorkMs = 3 * hourMs;
/** Room behind the last thing on the axis: the cap of a band is wider than its instant. */
const behindMs = 10 * 60_000;

/** px from the left end of the axis. */
export const toX = (axis: PlanAxis, instant: number): number =>
  ((instant - axis.from) / (axis.to - axis.from)) * axis.width;

/** The instant at a place of the axis. */
export const toInstant = (axis: PlanAxis, x: number): number => axis.from + (x / axis.width) * (axis.to - axis.from);

/**
 * First and last instant of a day's axis: the hours in which anybody works, now where it lies in that day, and the charges
 * as far as three hours beyond the work; on whole half hours, and never beyond the day.
 */
export function dayAxis(plan: BenchPlanDto, now: number): { from: number; to: number } {
  const [first, last] = [Date.parse(plan.from), Date.parse(plan.to)];
  const work = [...plan.open, ...plan.people.flatMap(({ present, blocks }) => [...present, ...blocks])].map(
    ({ from, to }) => ({ from: Date.parse(from), to: Date.parse(to) }),
  );
  if (work.length === 0)
    work.push({ from: instantOfDay(plan.day, 480, plan.zone), to: instantOfDay(plan.day, 1080, plan.zone) });
  let from = Math.min(...work.map((one) => one.from));
  let to = Math.max(...work.map((one) => one.to));
  const [soonest, latest] = [from - beyondWorkMs, to + beyondWorkMs];
  for (const { card } of plan.charges) {
    const begin = card.segments[0]?.from ?? card.startedAt ?? card.clipOnAt;
    const end = card.ready?.late ?? card.segments.at(-1)?.to ?? card.plannedReady.late;
    if (Date.parse(end) <= first || Date.parse(begin) >= last) continue;
    from = Math.min(from, Math.max(Date.parse(begin), soonest));
    to = Math.max(to, Math.min(Date.parse(end), latest));
  }
  if (now >= first && now < last) {
    from = Math.min(from, now);
    to = Math.max(to, now);
  }
  return {
    from: Math.max(first, Math.floor(from / halfHourMs) * halfHourMs),
    to: Math.min(last, Math.ceil((to + behindMs) / halfHourMs) * halfHourMs),
  };
}

/** Width of the flag with the clock of now, px: '13:42' or '12:42 pm'. */
export const flagWidth = (marks: LocaleMarks): number => (marks.hour12 ? 78 : 50);

/** px between words of the axis. */
const wordAir = 4;

/** Width of an hour's word, px. */
export const tickWordWidth = (marks: LocaleMarks): number => (marks.hour12 ? 62 : 38);

export interface AxisTick extends Tick {
  /** px */
  x: number;
  /** The flag of now stands over its word: only the tick is drawn. */
  quiet: boolean;
}

/** Left end of an hour's word: at the ends of the axis it is pushed inside. */
export function tickWordX(x: number, axis: PlanAxis, marks: LocaleMarks): number {
  const anchor = tickAnchor(x, axis.width, true);
  return anchor === 'start' ? x : x - tickWordWidth(marks) * (anchor === 'end' ? 1 : 0.5);
}

/** The hours of the axis; those under the flag of now, or under the word before them, without their word. */
export function axisTicks(axis: PlanAxis, zone: string, marks: LocaleMarks, now: number | null): AxisTick[] {
  const flag = now === null ? null : flagX(axis, now, marks);
  const reach = (axis.to - axis.from) / 1000;
  let wordEnd = -Infinity;
  return clockTicks({ zeroInstant: axis.from, fromS: 0, toS: reach, width: axis.width, zone, marks }).map((tick) => {
    const x = (tick.s / reach) * axis.width;
    const left = tickWordX(x, axis, marks);
    const right = left + tickWordWidth(marks);
    const underFlag = flag !== null && right + wordAir > flag && left - wordAir < flag + flagWidth(marks);
    const quiet = underFlag || left < wordEnd + wordAir;
    if (!quiet) wordEnd = right;
    return { ...tick, x, quiet };
  });
}

/** Left edge of the flag of now: centred over its line, and never beyond the ends of the axis. */
export const flagX = (axis: PlanAxis, now: number, marks: LocaleMarks): number =>
  Math.max(0, Math.min(axis.width - flagWidth(marks), toX(axis, now) - flagWidth(marks) / 2));

/** Where now stands on the axis; null where it lies outside. */
export const nowX = (axis: PlanAxis, now: number): number | null =>
  now < axis.from || now > axis.to ? null : toX(axis, now);
