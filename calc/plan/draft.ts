import type { Caution, ChannelParameters, Finish, StepKind, Way } from '../plan-types';
import type { Direction, TracePoint } from '../types';
import type { Sample } from './samples';

/** One step of a way before it has its place on the clock. */
export interface DraftStep {
  kind: StepKind;
  /** Brings low groups up at C/10. */
  precharge?: true;
  way: Way;
  channel: ChannelParameters | null;
  resistorId: string | null;
  groupIndexes: number[];
  /** Begins together with the step before it, on a channel of its own. */
  together: boolean;
  direction: Direction;
  setVolts: number | null;
  setAmps: number | null;
  /** Of the nominal run. */
  seconds: number;
  voltageLimitAtS: number | null;
  ampHours: number;
  wattHours: number;
  endAmps: number;
  /** Rest wanted after this step by the polarisation left, s. */
  settleS: number;
  /** Of all groups of the module after the step. */
  socAfter: number[];
  /** Over-voltage left in each group of `groupIndexes` at the end of current, V. */
  polarisationAfter: number[];
  /** Seconds from the step's start; `soc` of the groups of `groupIndexes`. */
  trace: TracePoint[];
  /** Groups whose mean the terminal volts of the trace are: series groups, 1 where they are joined. */
  groupsAcross: number;
  /** Highest set voltage that does no harm, V between the clips; null: nothing to set. */
  capVolts: number | null;
  /** Seconds of current in one sample of the band. */
  secondsIn: (sample: Sample) => number;
  /** Ampere-hours at the terminals in one sample. */
  ampHoursIn: (sample: Sample) => number;
}

/** A way with its finish and channels, before band and clock. */
export interface Draft {
  way: Way;
  finish: Finish;
  direction: Direction;
  steps: DraftStep[];
  setVolts: number | null;
  setVoltsCap: number | null;
  amps: number;
  busbarsOff: boolean;
  takes: string;
  cautions: Caution[];
  /** Charged to full or discharged to empty first, and counted from there. */
  knownEnd?: 'full' | 'empty';
  /** State of charge it ends at in one sample; with `knownEnd`. */
  endSocIn?: (sample: Sample) => number;
}

/** Why a way cannot be done, in place of a draft. */
export interface NotPossible {
  reason: string;
  /** The charger cannot be set low enough: the one reason that is a danger, not a lack. */
  ceiling?: boolean;
}

export const isPossible = (found: Draft | NotPossible): found is Draft => 'steps' in found;

export const isStep = (found: DraftStep | NotPossible): found is DraftStep => 'seconds' in found;
