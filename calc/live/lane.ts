import type { PlannedStep } from '../plan-types';
import type { ModuleState } from './module-state';

/** What readings have shown of the source, in place of what it was set to. */
export interface Drive {
  /** Most amps, positive; null: as set. */
  maxAmps: number | null;
  /** What the set voltage is more than dialled in, V between the clips. */
  setShiftVolts: number;
  /** A reading has shown a current in the taper. */
  seenInTaper: boolean;
}

export const AS_SET: Drive = { maxAmps: null, setShiftVolts: 0, seenInTaper: false };

/** The model run on from a state. */
export interface Forward {
  seconds: number;
  /** The step has met its end, and not only the cap in time. */
  ended: boolean;
  /** From when on a voltage limit rules, seconds from the start of the run; null: not in it. */
  taperAfterS: number | null;
  ampHours: number;
  /** At the end, signed. */
  amps: number;
  state: ModuleState;
}

/** One step between its clips while it is lived: how its current moves the module. */
export interface Lane {
  index: number;
  step: PlannedStep;
  sign: 1 | -1;
  /** Constant current as set, over thermal pauses its mean, positive; null: a resistor rules. */
  setAmps: number | null;
  /** On the mark trickles on after its end without harm: amps up to here say nothing; 0: any current after the end counts. */
  trickleAmps: number;
  /** Groups whose state the current moves. */
  touched: number[];
  /** Current the model has at a state, positive. */
  ampsAt: (state: ModuleState, drive: Drive) => number;
  /** Runs until the step's end, or for `maxSeconds`; with `onwards` past the end (the current was seen to flow). */
  forward: (state: ModuleState, drive: Drive, maxSeconds: number | null, onwards?: boolean) => Forward;
  /** Moves the module by a current that was read: straight from `fromAmps` to `toAmps`, both positive. */
  moved: (state: ModuleState, fromAmps: number, toAmps: number, seconds: number) => ModuleState;
  /** Volts between the clips. */
  clipVolts: (state: ModuleState, amps: number) => number;
  /** Within reach of its end at these amps: there only a run of the model says whether it has ended. */
  isNearEnd: (state: ModuleState, amps: number) => boolean;
  /** Whether a reading between the clips says that the set voltage rules. */
  atSetVolts: (terminalVolts: number, amps: number) => boolean;
  /** Drive that explains a reading in the taper. */
  driveInTaper: (state: ModuleState, amps: number) => Drive;
}
