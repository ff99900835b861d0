/** Shapes of the JSON columns of a charge. */
import type {
  Band,
  ChannelParameters,
  ModuleParameters,
  NeighbourState,
  ResistorParameters,
  SpareState,
  Spreads,
  TargetState,
  WorkshopParameters,
} from '@/calc/plan-types';
import type { Reckoning } from '@/calc/live-types';

/** The numbers a charge was planned with. Later changes of stock or equipment do not touch a charge that exists. */
export interface FrozenInputs {
  module: ModuleParameters;
  spare: SpareState;
  target: TargetState;
  channels: ChannelParameters[];
  resistors: ResistorParameters[];
  neighbour: NeighbourState | null;
  workshop: WorkshopParameters;
  celsius: number;
  seed: number;
  /** Standard deviations that stand in place of the defaults. */
  spreads?: Partial<Spreads>;
  lagLimitVolts: number;
  /** When the spare's reading was taken, epoch ms. */
  spareReadAt: number;
}

/** The last reckoning and the instant (epoch ms) it was made for. */
export interface StoredReckoning {
  at: number;
  reckoning: Reckoning;
  /** What the group readings of the rest say; null or left out: nothing. */
  rest?: StoredRest | null;
}

/** Forecast of a rest; seconds as in the reckoning. */
export interface StoredRest {
  /** Of each group, V. */
  settledVolts: Band[];
  /** That what is still to come is within a tenth of the tolerance in every group, 0…1. */
  chance: number;
  restedEnough: boolean;
  /** Since when, or when that is expected; null: not within a day. */
  enoughAtS: number | null;
  readings: number;
}
