/** What would shorten the waits: the recorded charges replayed under other rules. */
import * as z from 'zod/mini';
import { day, id, type Instant } from './common';

/** What is changed; several together are one question. */
export const leversSchema = z
  .object({
    /** One more channel like this one. */
    moreLikeChannelId: z.optional(id),
    /** Other amps on all channels like this one; held to the limit of every module type. */
    amps: z.optional(
      z.object({
        channelId: id,
        amps: z.number().check(z.gte(0.1, 'Amps are 0.1 or more.'), z.lte(1000, 'Amps are 1,000 at most.')),
      }),
    ),
    startAtBooking: z.optional(z.boolean()),
    /** Rest volts of a group at which spares of a module type are kept. */
    shelf: z.optional(
      z.object({
        moduleTypeId: id,
        volts: z.number().check(z.gt(0, 'Volts are above 0.'), z.lte(10, 'These are no volts of a group.')),
      }),
    ),
    lookInMinutes: z.optional(
      z
        .int()
        .check(z.gte(5, 'A look-in comes every 5 min at most.'), z.lte(1440, 'A look-in comes once a day at least.')),
    ),
    overnightAllowed: z.optional(z.boolean()),
    paralleledAllowed: z.optional(z.boolean()),
  })
  .check(
    z.refine((levers) => Object.values(levers).some((one) => one !== undefined && one !== false), {
      message: 'Tick at least one.',
    }),
  );
export type Levers = z.infer<typeof leversSchema>;

const period = { from: z.optional(day), to: z.optional(day) };

/** Each of the questions is replayed alone; `together` asks for all of them at once too. */
export const whatIfSchema = z.object({
  ...period,
  questions: z.array(leversSchema).check(z.minLength(1, 'Tick at least one.'), z.maxLength(12, 'Twelve at most.')),
  together: z.boolean(),
});
export type WhatIfInput = z.infer<typeof whatIfSchema>;

/** A figure with its 80 % interval. */
export interface IntervalDto {
  value: number;
  low: number;
  high: number;
}
export interface TooFewDto {
  enough: false;
  needs: number;
  has: number;
}
export interface ReplayDto {
  enough: true;
  charges: number;
  /** Charges that could not begin under these rules; they are in no figure. */
  unplaced: number;
  lostHoursPerWeek: IntervalDto;
  p50WaitHours: IntervalDto;
  p90WaitHours: IntervalDto;
}
export type ReplayAnswer = ReplayDto | TooFewDto;

export interface WhatIfDto {
  /** The same charges by the same replay as things are: what the others compare with. */
  now: ReplayAnswer;
  /** In the order of the questions. */
  answers: { levers: Levers; replay: ReplayAnswer }[];
  together: ReplayAnswer | null;
  /** Charges of the period that the replay had to leave out, and why. */
  leftOut: { charges: number; because: string }[];
}

export const shelfSchema = z.object({ ...period, moduleTypeId: id });
export type ShelfInput = z.infer<typeof shelfSchema>;

export interface ShelfDto {
  moduleTypeId: string;
  typeName: string;
  enough: true;
  /** Recorded targets that the curve stands on. */
  charges: number;
  /** Expected time on the charger against the shelf volts of a group; without those from which a target is out of reach. */
  curve: { volts: number; meanMinutes: number }[];
  best: { volts: number; meanMinutes: number };
  /** As spares of the type are kept: their median; null: none is on the shelf. */
  now: {
    volts: number;
    /** Null: from there a target cannot be reached with the present channels. */
    meanMinutes: number | null;
    spares: number;
  } | null;
  window: { lowVolts: number; highVolts: number };
  /** Bringing the present stock to the best takes this of the chargers, h; null: some of it cannot be brought there. */
  stockChargerHours: number | null;
}
export type ShelfAnswer = ShelfDto | (TooFewDto & { moduleTypeId: string; typeName: string });

export const channelsNeededSchema = z.object({
  ...period,
  /** More or fewer channels like this one. */
  channelId: id,
  wishedP90Hours: z.number().check(z.gte(0.1, 'Type 0.1 h or more.'), z.lte(1000, 'Type 1,000 h at most.')),
});
export type ChannelsNeededInput = z.infer<typeof channelsNeededSchema>;

export interface ChannelsNeededDto {
  enough: true;
  /** Channels of the kind there are now, and that would be needed; null: not even 24 give the wished wait. */
  present: number;
  channels: number | null;
  replay: ReplayDto;
  leftOut: { charges: number; because: string }[];
  /** By Erlang's formula, for all kinds together: a rough check; null: a charge alone takes longer than is wished. */
  roughChannels: number | null;
}
export type ChannelsNeededAnswer = ChannelsNeededDto | TooFewDto;

/** At most so many charges are replayed, the newest of the period; the others are told in `leftOut`. */
export const MOST_REPLAYED = 20_000;

/** A calculation over the history goes on beside the request that began it: it is asked for until it is over. */
export interface ReplayJobDto {
  id: string;
  kind: 'what-if' | 'shelf' | 'channels';
  state: 'queued' | 'running' | 'done' | 'cancelled' | 'failed';
  beganAt: Instant;
  /** Of all replays together, 0…1. */
  progress: number;
  /** Only where it is done. */
  whatIf: WhatIfDto | null;
  shelf: ShelfAnswer | null;
  channels: ChannelsNeededAnswer | null;
  /** Sentence why it failed; null: it has not. */
  problem: string | null;
}
