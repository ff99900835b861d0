/**
 * The contract of the core: one step through a source, and the ways to connect.
 *
 * Volts, amperes, ampere-hours, watts, ohms, seconds. Currents into the module are positive.
 */

/** One cell group: `p` cells in parallel, seen as one cell. */
export interface CellGroup {
  capacityAh: number;
  ohmicResistanceOhm: number;
  polarisationResistanceOhm: number;
  polarisationTimeConstantS: number;
  /** Rest voltage at the start, V. */
  restVolts: number;
  /** Over-voltage of the RC branch at the start, V; 0 unless a step is resumed. */
  polarisationVolts?: number;
}

/** Open-circuit voltage of one cell against state of charge; both columns rise strictly. */
export interface OcvTable {
  soc: number[];
  volts: number[];
}

/** What drives the current. All limits act at the supply's own terminals. */
export interface Source {
  maxAmps: number | null;
  setVolts: number | null;
  maxWatts: number | null;
  leadResistanceOhm: number;
  /** The highest (charging) or lowest (discharging) voltage under current that a watched group may take. */
  heldGroupVolts: number | null;
  /** Resistor a discharge runs into, ohm. */
  loadOhm: number | null;
}

export type Direction = 'charge' | 'discharge';

export interface StepStop {
  /** Sum of the groups' rest voltages to reach, V. */
  relaxedVolts: number | null;
  /** On that sum, V. */
  toleranceVolts: number;
  /** Ends when the first group's open-circuit voltage reaches this, V. */
  groupRelaxedVolts?: number | null;
  cutoffAmps: number | null;
  /** Ends when the first group is at this voltage under current, V. */
  groupVolts: number | null;
  maxSeconds?: number | null;
}

export interface StepInput {
  groups: CellGroup[];
  curve: OcvTable;
  linkResistanceOhm: number;
  /** Share of the charge that stays; applies to charging only. */
  coulombicEfficiency: number;
  direction: Direction;
  source: Source;
  stop: StepStop;
  /** The rest ends when the summed |v1| is within this, V. */
  settledVolts: number;
}

export interface StepOptions {
  /** Also give the course of the step, `trace`. */
  trace?: boolean;
}

export type StepOutcome = 'target' | 'cutoff' | 'group-limit' | 'time-cap' | 'unreachable';

export interface TracePoint {
  s: number;
  amps: number;
  terminalVolts: number;
  soc: number[];
}

export interface StepResult {
  outcome: StepOutcome;
  reason?: string;
  /** First moment a voltage limit (set voltage or held group) rules, s; 0 if from the start. */
  voltageLimitAtS: number | null;
  /** End of current, s. */
  stopAtS: number;
  /** From the end of current until settled, s. */
  settleS: number;
  totalS: number;
  /** At the module's terminals, positive. */
  ampHours: number;
  wattHours: number;
  /** Charge positive, discharge negative. */
  endAmps: number;
  endTerminalVolts: number;
  relaxedVolts: number;
  /** Volts under current at the stop. */
  groups: { volts: number; soc: number; polarisationVolts: number }[];
  /** 0-based; the group that held the current or ended the step. */
  limitingGroup: number | null;
  trace?: TracePoint[];
}

export interface GroupByGroupResult {
  /** Makespan of the currents over the channels, without the rest, s. */
  totalS: number;
  ampHours: number;
  wattHours: number;
  groups: StepResult[];
}

export interface ParalleledResult extends StepResult {
  joinedVolts: number;
  inrushAmps: number;
  worstPairAmps: number;
}

export interface EqualiseSide {
  groups: CellGroup[];
  curve: OcvTable;
  linkResistanceOhm?: number;
  coulombicEfficiency?: number;
}

export interface EqualiseInput {
  first: EqualiseSide;
  second: EqualiseSide;
  resistorOhm: number;
  /** Of the rest voltages, V. */
  stopDifferenceVolts: number | null;
  stopFirstRelaxedVolts?: number | null;
}

export interface EqualiseResult {
  outcome: 'target' | 'unreachable';
  reason?: string;
  stopAtS: number;
  ampHours: number;
  firstRelaxedVolts: number;
  secondRelaxedVolts: number;
  peakAmps: number;
}
