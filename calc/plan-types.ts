/**
 * What the planner takes and gives. Server and screens share these shapes; the server stores them with a charge.
 *
 * Seconds count from the moment of planning (0 = now) in a plan, and from the clip-on (0 = clipped on) in a stored option.
 */
import type { Direction, OcvTable } from './types';

export type ChemistryId = 'nmc' | 'lmo-blend' | 'lfp' | 'lto' | 'nimh';
export type Way = 'terminals' | 'group-by-group' | 'paralleled' | 'resistor';
export type Finish = 'on-the-mark' | 'over-and-settle';
/** Where a number comes from; it decides how wide its doubt is. */
export type NumberSource = 'measured' | 'label' | 'guessed';
/** Which resistance was typed: it decides the factor to the long one. */
export type ResistanceKind = 'pulse-0.5s' | 'pulse-10s' | 'ac-1khz' | 'long';
export type SpareCondition = 'sound' | 'swollen' | 'leaking' | 'dented' | 'water' | 'deep-discharged' | 'quarantined';

export interface ModuleParameters {
  chemistry: ChemistryId;
  groupsInSeries: number;
  cellsInParallel: number;
  ratedAh: number;
  /** Per group limits from the maker, V. */
  chargeLimitVolts: number;
  dischargeLimitVolts: number;
  /** Below this a group is never charged here, V. */
  floorVolts: number;
  maxChargeAmps: number;
  maxDischargeAmps: number;
  minChargeCelsius: number;
  maxChargeCelsius: number;
  /** Per group, ohm; null: the chemistry's guess scaled by capacity. */
  resistanceOhm: number | null;
  resistanceKind: ResistanceKind;
  /** Of the over-voltage that builds up, s, where it was read (pulseTimeConstant); null or left out: the chemistry's guess. */
  polarisationTimeConstantS?: number | null;
  linkResistanceOhm: number;
  /** Share of its charge current below 10 °C and above 45 °C; charger chips have 0.2 to 0.4 (JEITA); left out: all of it. */
  coldCurrentShare?: number | null;
  warmCurrentShare?: number | null;
  /** A group that rests below this is first brought up to it at C/10, V; null or left out: no such step. */
  prechargeBelowVolts?: number | null;
  /** The workshop's own curve; null: the chemistry's. */
  curve: OcvTable | null;
  /** Share of rated capacity lost from the charge a month on the shelf; null: the chemistry's. */
  selfDischargePerMonth: number | null;
}

export interface SpareState {
  groupVolts: number[];
  readingAgeS: number;
  celsius: number | null;
  /** Meter the spare was read with; null: not known. */
  meterId: string | null;
  /** Capacity of one group, Ah; per group where they were measured apart. */
  capacityAh: number | number[];
  capacitySource: NumberSource;
  /** Standard deviation as a share of the capacity; null: the default of its source. */
  capacityRelativeSd: number | null;
  condition: SpareCondition;
  quarantineReason: string | null;
}

export interface TargetState {
  /** Rest voltage per group, V; does not count where `soc` is given. */
  volts: number;
  /**
   * The pack's state of charge, 0…1, typed or from its own counter, in place of the volts: where voltage says little of it
   * (LFP and NiMH on their plateau), the charge is then counted from full or empty.
   */
  soc?: number | null;
  /** Standard deviation of `soc`; default 0.02, a guess. */
  socSd?: number | null;
  toleranceVolts: number;
  meterId: string | null;
  celsius: number | null;
  /** Standard error where it is known, V. */
  sdVolts: number | null;
}

export interface ChannelParameters {
  channelId: string;
  /** As people say it: 'A1'. */
  name: string;
  maxAmps: number;
  /** The least current it holds, A; on the mark cannot taper below it. */
  minAmps: number;
  maxVolts: number;
  maxWatts: number | null;
  /** The set voltage can be chosen. */
  adjustableVolts: boolean;
  /** Where it measures its voltage. */
  senses: 'own-terminals' | 'module';
  leadResistanceOhm: number;
  /** False: the leads are a guess (10 mΩ where `leadResistanceOhm` is 0) and so doubtful. Left out: as given. */
  leadsMeasured?: boolean;
  displayStepVolts: number;
  /** What its current is set and shown in, A; left out: without steps. */
  displayStepAmps?: number;
  /** It gives only this share of its current in a room warmer than that. */
  derating?: { aboveCelsius: number; ampsShare: number } | null;
  /** Share of the time in which it gives current, between thermal pauses; left out: all of it. */
  duty?: number;
  singleGroup: boolean;
  canDischarge: boolean;
  dischargeAmps: number | null;
  loadOhm: number | null;
  /** Seconds from now until it is free. */
  freeInS: number;
  /** Meter cross-checked with the workshop's, mV; null: never. */
  offsetSdVolts: number | null;
  /** Learned of this module type on this charger; null: taken off; left out: the plan's. */
  timeFactor?: TimeFactor | null;
}

/** By how much charges take longer than reckoned, learned from closed ones (learnedFactor). */
export interface TimeFactor {
  /** Multiplies the seconds of current. */
  mean: number;
  /** How far the next charge may be off that, in the same unit as the mean. */
  sd: number;
  /** Closed charges behind it. */
  charges: number;
}

export interface ResistorParameters {
  resistorId: string;
  name: string;
  ohm: number;
  maxWatts: number;
}

/** A module of known charge that a resistor may join to the spare. */
export interface NeighbourState {
  label: string;
  groupVolts: number[];
  capacityAh: number;
}

export interface WorkshopParameters {
  minRestS: number;
  lookInIntervalS: number;
  /** Inrush on joining groups, as a multiple of one group's capacity per hour. */
  inrushLimitC: number;
  /** Hands-on times, s. */
  clipOnS: number;
  clipOffS: number;
  checkS: number;
  busbarsS: number;
  /** Seconds from now at which nobody is there any more today; null: not known. */
  closesInS: number | null;
  /** Current above which a caution is given, as a multiple of one group's capacity per hour; default 0.5. */
  rateLimitC?: number;
}

export interface PlanInput {
  module: ModuleParameters;
  spare: SpareState;
  target: TargetState;
  channels: ChannelParameters[];
  resistors: ResistorParameters[];
  neighbour: NeighbourState | null;
  workshop: WorkshopParameters;
  /** Seconds from now at which the module is to be ready; null: as soon as can be. */
  readyByS: number | null;
  /** Seconds from now of the clip-on; 0: now. */
  clipOnAtS: number;
  celsius: number;
  /** Seed of the sample set; the same seed gives the same band to the last digit. */
  seed: number;
  /** Samples of the band; default 64. */
  samples?: number;
  /** Standard deviations that stand in place of the defaults (calc/plan/default-spreads.ts). */
  spreads?: Partial<Spreads>;
  /** Learned of this module type, for channels without one of their own; null or left out: none. */
  timeFactor?: TimeFactor | null;
  /**
   * Whether a person takes the wide band of a voltage target on the plateau of LFP or NiMH. False: such a plan is refused,
   * with the band it would have. Left out: it is offered with its cautions.
   */
  acceptWideBand?: boolean;
}

/** How far each number may be off: one standard deviation, unless said otherwise. */
export interface Spreads {
  /** Share of the capacity. */
  capacityRelative: number;
  /** Share of the resistance. */
  resistanceRelative: number;
  /** Share of the charger's current. */
  currentRelative: number;
  /** Offset of a meter, V: one per meter, so that it cancels where the same meter read both. */
  meterVolts: number;
  /** Scatter of a single group's reading, V. */
  readingVolts: number;
  /** Of the target beside its meter's offset, V. */
  targetVolts: number;
  /** Offset of the charger's own voltmeter per group, V: it decides where an on-the-mark charge ends. */
  chargerVolts: number;
  /** Offset of the whole open-circuit curve, V. */
  curveVolts: number;
  /** Half width of the hysteresis loop per group, V; taken as equally likely anywhere inside. */
  hysteresisVolts: number;
  /** Of the module's temperature, °C. */
  temperatureCelsius: number;
  /** Share of the self-discharge since the reading. */
  selfDischargeRelative: number;
}

export interface Band {
  p10: number;
  p50: number;
  p90: number;
}

export type SegmentKind = 'queue' | 'hands' | 'cc' | 'taper' | 'rest' | 'check';

export interface Segment {
  kind: SegmentKind;
  fromS: number;
  toS: number;
}

export type StepKind = 'pre-level' | 'bulk' | 'trim';

/** One connection held for one stretch of current; a charge is an ordered list of these. */
export interface PlannedStep {
  kind: StepKind;
  way: Way;
  channelIds: string[];
  resistorId: string | null;
  /** 0-based groups it moves; all of them in a bulk step through the terminals. */
  groupIndexes: number[];
  direction: Direction;
  /** Seconds of current, from the start of the option. */
  startS: number;
  stopS: number;
  /** What to dial in: volts and amps at the charger. */
  setVolts: number | null;
  setAmps: number | null;
  /** Where it stops by count, Ah at the terminals; on the mark this is only expected. */
  ampHours: number;
  wattHours: number;
  endAmps: number;
  voltageLimitAtS: number | null;
  /** Brings low groups up at C/10, before the charge proper. */
  precharge?: true;
  /** Rest voltages per group after it has settled, V (of all groups of the module). */
  restVoltsAfter: number[];
}

export interface TracePlanPoint {
  s: number;
  amps: number;
  /** Mean of the groups under current, V. */
  clipVolts: number;
  /** Mean rest voltage of the groups, V. */
  restVolts: number;
  /** Where it may be at that moment, 10 and 90 % of the samples, V. */
  restLowVolts?: number;
  restHighVolts?: number;
}

export type Doubt =
  | 'capacity'
  | 'resistance'
  | 'current'
  | 'spare-reading'
  | 'target-reading'
  | 'curve'
  | 'temperature'
  | 'charger'
  | 'leads';

export interface Caution {
  code:
    | 'flat-curve'
    | 'hysteresis'
    | 'old-reading'
    | 'other-meter'
    | 'group-spread'
    | 'high-rate'
    | 'busbars-off'
    | 'unattended'
    | 'cold-or-warm'
    | 'unknown-health'
    | 'curve-extended'
    | 'inrush'
    | 'ends-apart'
    | 'no-adjustable-volts'
    | 'thin-leads'
    | 'meter-unchecked';
  /** One sentence for a person. */
  text: string;
}

export interface PlanOption {
  /** Stable within a plan: way, finish and channels. */
  id: string;
  way: Way;
  finish: Finish;
  direction: Direction;
  channelIds: string[];
  /** 'B1 · 20 A' */
  channelText: string;
  amps: number;
  steps: PlannedStep[];
  /** From clip-on (option's 0) to ready: wait for the channel, hands, current, rest and check. */
  totalS: Band;
  /** Wait until the channel is free, s; the first segment. */
  queueS: number;
  /** First current, s from the option's 0: the moment that a running charge counts as 0. */
  currentStartS: number;
  /** Last current of the nominal run, s from the option's 0. */
  currentEndS: number;
  /** The likely run, for the ribbon; starts at 0. */
  segments: Segment[];
  trace: TracePlanPoint[];
  /** Charge at the terminals over all steps, Ah: through the terminals counted once, group by group and paralleled over all groups. */
  ampHours: number;
  wattHours: number;
  handsOnS: number;
  busbarsOff: boolean;
  /** What is taken apart or set up, one sentence. */
  takes: string;
  /** Difference between highest and lowest group after the rest, V. */
  endSpreadVolts: number;
  /** Rest voltage per group after the rest, V. */
  endGroupVolts: number[];
  /** Every group ends within the tolerance; an option that does not is never marked soonest. */
  withinTolerance: boolean;
  /** What the charger is set to in the bulk step, V; null for a resistor. */
  setVolts: number | null;
  /** The highest set voltage that keeps a forgotten charger safe, V over the module (bulk step). */
  setVoltsCap: number | null;
  restS: number;
  /** Latest clip-on so that it is ready by the wished time with 90 %, s from planning; null without a wish. */
  latestStartS: number | null;
  /** Cannot be ready by the wished time even when clipped on at `clipOnAtS`. */
  tooLate: boolean;
  soonest: boolean;
  soonestBusbarsStay: boolean;
  dominant: Doubt;
  /** How many seconds the 10–90 % band would narrow were the dominant number known. */
  narrowsByS: number;
  cautions: Caution[];
  /** Charged to full (or discharged to empty) first and counted from there; left out: by voltage. */
  knownEnd?: 'full' | 'empty';
  /** State of charge that it ends at, by the doubt of the capacity; with `knownEnd` only. */
  endSoc?: Band;
  /** What closed charges have taught of its times, already in the band; left out: nothing. */
  timeFactor?: TimeFactor;
  /** 'Learned from 14 charges: 6 % longer than reckoned.' */
  timeFactorText?: string;
}

export interface RuledOutWay {
  way: Way;
  finish: Finish;
  channelId: string | null;
  channelName: string | null;
  reason: string;
}

export interface Refusal {
  code:
    | 'deep-discharged'
    | 'reversed'
    | 'temperature'
    | 'condition'
    | 'target-over-limit'
    | 'target-under-limit'
    | 'ceiling'
    | 'numbers'
    | 'quarantined';
  /** 0-based, where one group is the reason. */
  group: number | null;
  text: string;
  /** Refused because the curve is flat at the target: what the soonest way would take all the same, and where it would end. */
  plateau?: { totalS: Band; soc: Band };
}

export interface ChargePlan {
  direction: Direction;
  /** Sorted, soonest first. */
  options: PlanOption[];
  ruledOut: RuledOutWay[];
  /** Every group is within the tolerance already: nothing to charge, `options` is empty. */
  alreadyWithin: boolean;
  /** Not empty: this spare cannot be charged to this target here at all; `options` is empty then. */
  refusals: Refusal[];
  cautions: Caution[];
  /** Charge each group takes, Ah. */
  groupAmpHours: number[];
  /** The spare's rest voltages after its days on the shelf, V. */
  startVolts: number[];
}

/** A plain verdict after the rest. */
export interface GroupVerdict {
  group: number;
  volts: number;
  /** Volts minus target, V. */
  deviationVolts: number;
  within: boolean;
  /** Charge still to bring in (positive) or take out, Ah. */
  ampHoursToGo: number;
}

export interface CheckVerdict {
  within: boolean;
  groups: GroupVerdict[];
  spreadVolts: number;
  worstGroup: number;
}
