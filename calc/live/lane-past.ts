import type { Drive } from './lane';
import type { ModuleState } from './module-state';

/** A stretch in which current may flow, both ends known. */
export interface Stretch {
  fromS: number;
  toS: number;
}

/** A reading as one lane sees it, positive amps; null: the current was not read. */
export interface LaneReading {
  /** Among the readings of the charge. */
  index: number;
  s: number;
  amps: number | null;
  terminalVolts: number | null;
  /** Ampere-seconds since the reading before, where more were read between the two than are kept, or it may have paused. */
  ampSeconds?: number;
  /** Readings it stands for, itself among them; left out: itself. */
  count?: number;
  /** The current at that instant, where `amps` is its mean over thermal pauses. */
  readAmps?: number;
  /** Read in a thermal pause. */
  paused?: true;
}

/** A reading of the current. */
export type AmpsReading = LaneReading & { amps: number };

/** One lane at the instant of a reading, after it was taken in. */
export interface Knot {
  index: number;
  state: ModuleState;
  deliveredAh: number;
  /** As read, else by the model; positive. */
  amps: number;
  /** What the source would give as set, at that state; positive. */
  dueAmps: number;
  /** In a thermal pause: no current, and no fault. */
  paused: boolean;
  /** A voltage limit rules. */
  tapering: boolean;
  /** No current was read while some was due. */
  noCurrent: boolean;
  /** The current is over. */
  over: boolean;
}

export interface LanePast {
  state: ModuleState;
  /** End of current, s; null: not yet. */
  endedAtS: number | null;
  /** From when a voltage limit ruled, s; null: not so far. */
  taperAtS: number | null;
  /** At the terminals, positive, Ah. */
  deliveredAh: number;
  /** Positive, at the end of the last stretch. */
  amps: number;
  drive: Drive;
  /** The last reading showed no current while some was due. */
  noCurrent: boolean;
  /** The last reading showed current after the reckoned end. */
  overrun: boolean;
  /** One for each reading of its stretches. */
  knots: Knot[];
  /** When the last current ended, or now. */
  endState: ModuleState;
}

export const isAmpsReading = (reading: LaneReading): reading is AmpsReading => reading.amps !== null;

/** Readings as one lane of `shareOf` the current sees them. */
export const laneReadings = (readings: readonly LaneReading[], shareOf: number, alone: boolean): LaneReading[] =>
  readings.map((reading) => ({
    ...reading,
    amps: reading.amps === null ? null : Math.abs(reading.amps) * shareOf,
    terminalVolts: alone ? reading.terminalVolts : null,
    ...(reading.ampSeconds === undefined ? {} : { ampSeconds: reading.ampSeconds * shareOf }),
  }));
