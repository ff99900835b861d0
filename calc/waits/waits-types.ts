/**
 * What the waiting statistics and the replay take and give. Minutes count from an instant the caller chooses.
 */

/** A stretch of time in which somebody is there; it ends after it begins. */
export interface OpenMinutes {
  fromMinutes: number;
  toMinutes: number;
}

/** How long a calculation may go on. */
export interface WaitsControl {
  /** Told every few thousand events how many of how many charges have begun. */
  progress?: (done: number, all: number) => void;
  /** Asked as often: true ends the calculation, which then gives null. */
  shouldStop?: () => boolean;
}

/** The input of the simulator: charges that come and channels that take them. */
export interface QueueInput {
  /** When each charge may begin, ascending, min. */
  arrivalMinutes: ArrayLike<number>;
  /** The order of those that wait: the least first, then the first come; left out: first come. */
  dueMinutes?: ArrayLike<number>;
  /** Channels of each kind; at most 20 kinds. */
  channels: readonly number[];
  /** How long a charge holds a channel of a kind, min; null: that kind cannot carry it out. */
  serviceMinutes: (charge: number, kind: number) => number | null;
  /** When somebody is there, ascending and apart; null: always. No charge begins outside. */
  open: readonly OpenMinutes[] | null;
  /** The longest absence a running charge may meet, min; left out: any. */
  lookInMinutes?: number;
  /** Charges that may run while nobody is there; left out: none. */
  mayRunUnwatched?: (charge: number) => boolean;
}

export interface QueueResult {
  /** When each began, min; NaN: it never could. */
  startMinutes: Float64Array;
  /** When each was over, min; NaN: it never began. */
  endMinutes: Float64Array;
  /** Index of the kind that took it; −1: none. */
  kind: Int32Array;
  /** How many never began. */
  unplaced: number;
}

/** A finished charge as it happened. */
export interface RecordedCharge {
  id: string;
  /** When its module was wanted: the wait counts from here, min. */
  arrivalMinutes: number;
  /** When the repair was booked: the first it could have begun; null: not known, `arrivalMinutes`. */
  bookedMinutes: number | null;
  /** When it was due; null: the order of coming. */
  dueMinutes: number | null;
  /** Index of the channel kind that carried it out. */
  kind: number;
  /** How long it really held its channel, min. */
  actualMinutes: number;
  /** From then until it was ready, at rest and checked, whatever it ran on, min; left out: at once. */
  afterMinutes?: number;
  /** Share of the wait that was used for other work, 0…1. */
  usedShare: number;
  /** It ran while nobody was there. */
  ranUnwatched: boolean;
}

/** What is changed; several together are one question. */
export interface ReplayLevers {
  /** One more channel of this kind. */
  moreOfKind?: number;
  /** Amps of a kind; the caller's model keeps them within each module type's limit. */
  amps?: { kind: number; amps: number };
  startAtBooking?: boolean;
  /** Shelf volts of a group, for the caller's model. */
  shelfVolts?: number;
  lookInMinutes?: number;
  overnightAllowed?: boolean;
  /** For the caller's model. */
  paralleledAllowed?: boolean;
}

export interface ReplayInput {
  /** In any order. */
  charges: readonly RecordedCharge[];
  channels: readonly number[];
  open: readonly OpenMinutes[] | null;
  lookInMinutes: number;
  /** The charge model: minutes of a charge on a kind under the levers; null: that kind cannot. */
  durationMinutes: (charge: RecordedCharge, kind: number, levers: ReplayLevers) => number | null;
  /** Of the interval's draws. */
  seed: number;
}

/** A figure with its 80 % interval. */
export interface WaitFigure {
  value: number;
  low: number;
  high: number;
}

export interface TooFew {
  enough: false;
  needs: number;
  has: number;
}

export interface ReplayResult {
  enough: true;
  /** Charges that took part and were carried out. */
  count: number;
  /** Charges that could not begin under these rules; they are in no figure. */
  unplaced: number;
  /** Open hours waited for and not used, per week. */
  lostHoursPerWeek: WaitFigure;
  /** Wall hours from wanted to ready. */
  p50WaitHours: WaitFigure;
  p90WaitHours: WaitFigure;
}
