/** Waits of the charges that became ready: where the hours of waiting go. */
import * as z from 'zod/mini';
import { day, id, type Instant } from './common';

export const waitStages = ['queue', 'charging', 'tapering', 'resting', 'check-due'] as const;
export type WaitStage = (typeof waitStages)[number];

export const waitWays = ['terminals', 'group-by-group', 'paralleled', 'resistor'] as const;

const filters = {
  /** First and last day in the workshop's zone, both counted; left out: eight whole weeks and the present one. */
  from: z.optional(day),
  to: z.optional(day),
  moduleTypeId: z.optional(id),
  /** Charger and channel of the first step; 'none': of charges that used none. */
  chargerId: z.optional(id),
  channelId: z.optional(id),
  /** Whose charge it was when it became ready. */
  technicianId: z.optional(id),
  way: z.optional(z.enum(waitWays)),
  /** Of the day on which it became ready; 1: Monday. */
  weekday: z.optional(z.enum(['1', '2', '3', '4', '5', '6', '7'])),
  /** Hours, median and p90 are then of this stage alone, and charges without it are left out. */
  stage: z.optional(z.enum(waitStages)),
};
export const waitsQuerySchema = z.object(filters);
export type WaitsQuery = z.infer<typeof waitsQuerySchema>;

/** What the waits can be parted by; stages and weeks come with every answer. */
export const waitDimensions = ['module-type', 'charger', 'channel', 'technician', 'way', 'weekday'] as const;
export type WaitDimension = (typeof waitDimensions)[number];
export const waitGroupsQuerySchema = z.object({ ...filters, by: z.enum(waitDimensions) });
export type WaitGroupsQuery = z.infer<typeof waitGroupsQuerySchema>;

/** Under so many charges a figure is given with `few`: it says little. */
export const FEW_CHARGES = 5;

/** Of a number of charges; medians and 90th percentiles are quantiles of type 7. */
export interface WaitSpreadDto {
  charges: number;
  /** Fewer than 5 stand behind it. */
  few: boolean;
  waitHours: number;
  medianS: number;
  p90S: number;
  /** Of the hours of waiting in the workshop's working hours: in which one of its people was at other work, and the rest. */
  usedHours: number;
  lostHours: number;
}

/** Planned against actual finish. */
export interface WaitAgainstPlanDto {
  /** Actual minus planned likely finish, s: its median, its mean (the bias), and the median of its size. */
  againstPlanS: number;
  biasS: number;
  absErrorS: number;
  /** Share whose finish lay inside its 10–90 % band: 0.8 is the aim. */
  insideBand: number;
}

export interface WaitGroupDto extends WaitSpreadDto, WaitAgainstPlanDto {
  /** 'none' where a charge used no charger or nobody had it. */
  key: string;
  name: string;
}

export interface WaitWeekDto extends WaitSpreadDto {
  /** Monday of the week in the workshop's zone, and its ISO number. */
  monday: string;
  week: number;
}

/** A stage over the charges that had it. */
export interface WaitStageDto {
  stage: WaitStage;
  charges: number;
  few: boolean;
  waitHours: number;
  medianS: number;
  p90S: number;
}

/** How busy a channel was within the workshop's working hours of the period, as far as they have passed. */
export interface ChannelBusyDto {
  channelId: string;
  name: string;
  chargerName: string;
  retired: boolean;
  busyHours: number;
  openHours: number;
  /** 0…1; null: there were no working hours. */
  share: number | null;
}

export interface WaitsDto extends WaitSpreadDto {
  from: string;
  to: string;
  /** Null where no charge stands behind it. */
  plan: WaitAgainstPlanDto | null;
  weeks: WaitWeekDto[];
  stages: WaitStageDto[];
  byModuleType: WaitGroupDto[];
  channels: ChannelBusyDto[];
}

export interface WaitGroupsDto {
  by: WaitDimension;
  /** Most charges first; weekdays from Monday on. */
  groups: WaitGroupDto[];
}

/** The charges behind a number: the same filters, a page after another. */
export const waitChargesQuerySchema = z.object({
  ...filters,
  /** Monday of a week: only what became ready in it. */
  week: z.optional(day),
  /** `next` of the page before. */
  after: z.optional(z.string().check(z.regex(/^\d{1,16}\.[A-Za-z0-9_-]{1,64}$/, 'This page is not one of ours.'))),
});
export type WaitChargesQuery = z.infer<typeof waitChargesQuerySchema>;

export interface WaitRowDto {
  chargeId: string;
  title: string;
  typeName: string;
  chargerName: string;
  channelName: string;
  technicianName: string;
  way: (typeof waitWays)[number];
  askedAt: Instant;
  readyAt: Instant;
  waitS: number;
  usedS: number;
  lostS: number;
  plannedS: number;
  actualS: number;
  insideBand: boolean;
  stages: { stage: WaitStage; seconds: number }[];
}

export interface WaitChargesDto {
  /** Newest first, 100 at most. */
  rows: WaitRowDto[];
  /** Null: this is the last page. */
  next: string | null;
}

/** `what` is the figure whose table is wanted; left out: the charges themselves. */
export const waitsCsvQuerySchema = z.object({
  ...waitChargesQuerySchema.shape,
  what: z.optional(z.enum(['charges', 'weeks', 'stages', 'channels', ...waitDimensions])),
});
export type WaitsCsvQuery = z.infer<typeof waitsCsvQuerySchema>;

/** The period of the filters against an earlier or later one. */
export const compareWaitsQuerySchema = z.object({ ...filters, compareFrom: day, compareTo: day });
export type CompareWaitsQuery = z.infer<typeof compareWaitsQuerySchema>;

export interface WaitPeriodDto extends WaitSpreadDto {
  from: string;
  to: string;
  lostHoursPerWeek: number;
}

export interface CompareWaitsDto {
  /** The period that is compared with, and that of the filters. */
  before: WaitPeriodDto;
  then: WaitPeriodDto;
  /** Null: one of the two has fewer than 5 charges. */
  difference: {
    /** Median of `then` minus median of `before`, s, with its 95 % bootstrap interval. */
    medianS: number;
    lowS: number;
    highS: number;
    /** Of the two-sided Mann–Whitney rank test over all charges of both. */
    p: number;
    /** p below 0.05 and the interval without 0. */
    clear: boolean;
    /** 'Shorter by 25 min (10 to 40 min, 95 % bootstrap interval); rank test p = 0.003.' */
    text: string;
  } | null;
}
