/** Seven days of the bench, coarse: per day the stretches in which a channel is held, and the hours of each person. Pure. */
import type { BenchPlanDto, PlanChargeDto, PlanPersonDto, Span } from '@/shared/contract/bench-plan';
import { addDays, instantOfDay } from '../format/zone';

export interface WeekDay {
  /** 'YYYY-MM-DD' */
  day: string;
  /** Midnight to midnight by the workshop's clock, epoch ms: 23 or 25 h where the clock is changed. */
  from: number;
  to: number;
  /** Anybody's hours or opening hours lie in it. */
  open: boolean;
}

const overlapMs = ({ from, to }: Span, day: { from: number; to: number }): number =>
  Math.max(0, Math.min(Date.parse(to), day.to) - Math.max(Date.parse(from), day.from));

/** The days of a plan with their bounds. */
export function weekDays(plan: Pick<BenchPlanDto, 'day' | 'days' | 'zone' | 'open'>): WeekDay[] {
  return Array.from({ length: plan.days }, (_, index) => {
    const day = addDays(plan.day, index);
    const bounds = { from: instantOfDay(day, 0, plan.zone), to: instantOfDay(addDays(day, 1), 0, plan.zone) };
    return { day, ...bounds, open: plan.open.some((span) => overlapMs(span, bounds) > 0) };
  });
}

/**
 * The hours of the clock that a day's cell shows: from the earliest opening to the latest closing of the week, whole hours;
 * what happens at night lies at the edges.
 */
export function weekHours(plan: Pick<BenchPlanDto, 'open'>, days: readonly WeekDay[]): { from: number; to: number } {
  const hour = 3_600_000;
  let [from, to] = [24, 0];
  for (const day of days)
    for (const span of plan.open) {
      if (overlapMs(span, day) === 0) continue;
      from = Math.min(from, Math.floor((Math.max(Date.parse(span.from), day.from) - day.from) / hour));
      to = Math.max(to, Math.ceil((Math.min(Date.parse(span.to), day.to) - day.from) / hour));
    }
  return from < to ? { from, to } : { from: 8, to: 18 };
}

export interface WeekBar {
  charge: PlanChargeDto;
  /** Share of the cell, 0…1. */
  left: number;
  right: number;
  /** It came from the day before, or goes on into the next. */
  before: boolean;
  after: boolean;
}

/** The charges that hold a channel on a day. */
export function weekBars(
  charges: readonly PlanChargeDto[],
  channelId: string,
  day: WeekDay,
  hours: { from: number; to: number },
): WeekBar[] {
  const [begin, end] = [day.from + hours.from * 3_600_000, day.from + hours.to * 3_600_000];
  const at = (instant: number) => Math.max(0, Math.min(1, (instant - begin) / (end - begin)));
  return charges
    .flatMap((charge) =>
      charge.holds
        .filter((hold) => hold.channelId === channelId && overlapMs(hold, day) > 0)
        .map((hold) => ({
          charge,
          left: at(Date.parse(hold.from)),
          right: at(Date.parse(hold.to)),
          before: Date.parse(hold.from) < day.from,
          after: Date.parse(hold.to) > day.to,
        })),
    )
    .sort((a, b) => a.left - b.left);
}

/** Minutes of a person's day: there, with work of their own or fills, and free. */
export function personDay(
  person: Pick<PlanPersonDto, 'present' | 'blocks' | 'free' | 'daysOff'>,
  day: WeekDay,
): { there: number; busy: number; free: number; off: string | null } {
  const minutes = (spans: readonly Span[]) =>
    Math.round(spans.reduce((sum, span) => sum + overlapMs(span, day), 0) / 60_000);
  const off = person.daysOff.find((one) => one.day === day.day);
  return {
    there: minutes(person.present),
    busy: minutes(person.blocks),
    free: minutes(person.free),
    off: off ? (off.note ?? 'off') : null,
  };
}
