/** What the thread of the waits is asked, and what it answers: plain numbers both ways, and memory both see. */
import type { ReplayAnswer, ReplayDto, TooFewDto } from '@/shared/contract/waits-replay';
import type { ReplayChange, ReplayHistory } from './replay-history';

export interface CompareTask {
  kind: 'compare';
  /** Lengths of two periods, ms; neither is empty. */
  before: number[];
  then: number[];
  seed: number;
}
export interface CompareAnswer {
  /** Difference of the medians, then − before, ms, with its 95 % interval, and the rank test's p. */
  value: number;
  low: number;
  high: number;
  p: number;
}

export interface WhatIfTask {
  kind: 'what-if';
  history: ReplayHistory;
  questions: ReplayChange[];
  together: boolean;
  control: SharedArrayBuffer;
}
export interface WhatIfAnswer {
  now: ReplayAnswer;
  /** In the order of the questions. */
  answers: ReplayAnswer[];
  together: ReplayAnswer | null;
}

export interface ChannelsTask {
  kind: 'channels';
  history: ReplayHistory;
  /** Index of the kind to have more or fewer of. */
  channelKind: number;
  wishedP90Hours: number;
  control: SharedArrayBuffer;
}
export type ChannelsAnswer =
  TooFewDto | { enough: true; channels: number | null; roughChannels: number | null; replay: ReplayDto };

export interface ShelfTask {
  kind: 'shelf';
  /** Of one module type. */
  history: Pick<ReplayHistory, 'kinds' | 'types' | 'hands'>;
  /** Recorded targets, and the stock, as rest volts of a group. */
  targets: number[];
  stockVolts: number[];
  window: { lowVolts: number; highVolts: number };
  control: SharedArrayBuffer;
}
export type ShelfSolved =
  | TooFewDto
  | {
      enough: true;
      charges: number;
      /** Only where every target can be reached from. */
      curve: { volts: number; meanMinutes: number }[];
      best: { volts: number; meanMinutes: number };
      /** Of the stock's median; null: there is no stock, or a target cannot be reached from it. */
      presentVolts: number | null;
      presentMinutes: number | null;
      /** Null: some of the stock cannot be brought to the best. */
      stockChargerHours: number | null;
    };

export type WaitsTask = CompareTask | WhatIfTask | ChannelsTask | ShelfTask;
/** Null: it was told to stop. */
export interface WaitsAnswers {
  compare: CompareAnswer;
  'what-if': WhatIfAnswer | null;
  channels: ChannelsAnswer | null;
  shelf: ShelfSolved | null;
}
export type WaitsAnswer = WaitsAnswers[keyof WaitsAnswers];
