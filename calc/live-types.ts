/** What the reckoning of a running charge takes and gives. Seconds count from the clip-on. */
import type {
  Band,
  Doubt,
  ModuleParameters,
  PlanOption,
  Segment,
  SpareState,
  TargetState,
  WorkshopParameters,
  ChannelParameters,
  ResistorParameters,
  Spreads,
} from './plan-types';

/** A reading while the charge runs or rests. */
export interface LiveReading {
  s: number;
  terminalVolts: number | null;
  amps: number | null;
  celsius: number | null;
  groupVolts: number[] | null;
  /**
   * Where `terminalVolts` was read: at the supply's own terminals or at the module. Left out: at the module for a charger that
   * senses there, else it may be either.
   */
  takenAt?: 'supply' | 'module';
  /** Meter it was read with; left out or null: the charger's own display for `terminalVolts`, an unknown one for the groups. */
  meterId?: string | null;
}

export type OddKind = 'voltage-jump' | 'no-current' | 'stuck-current' | 'group-ahead' | 'too-warm' | 'unexplained';

/** A reading that no sample explains. It is not learned from. */
export interface OddSeen {
  kind: OddKind;
  /** What `seen` and `expected` are: V between the clips, A, V of a group, °C. */
  quantity: 'terminal-volts' | 'amps' | 'group-volts' | 'celsius';
  /** 0-based, where it is one group's. */
  group: number | null;
  seen: number;
  expected: number;
  /** Instant of the first of them, s, and how many readings in a row are so. */
  sinceS: number;
  readings: number;
}

/** A number of the module or its leads, before and after the readings of this charge. */
export interface Learned {
  mean: number;
  sd: number;
  priorMean: number;
  priorSd: number;
}

/** Stretches in which current may flow: begin and end (null: still) of clip-on, hold, resume. */
export interface RunStretch {
  fromS: number;
  toS: number | null;
  /**
   * Step of the option (0-based, the first of those that run side by side) that this stretch belongs to. A step ends
   * with its last stretch; the next one begins with its own first stretch and never by itself, because a hand swaps the
   * clips. Left out: 0.
   */
  stepIndex?: number;
}

export interface ReckonInput {
  module: ModuleParameters;
  spare: SpareState;
  target: TargetState;
  channels: ChannelParameters[];
  resistors: ResistorParameters[];
  workshop: WorkshopParameters;
  option: PlanOption;
  celsius: number;
  runs: RunStretch[];
  /** In order of time; late ones are sorted in by the caller. */
  readings: LiveReading[];
  /** End of current where a person has said it, s; null: as reckoned. */
  currentOffAtS: number | null;
  nowS: number;
  seed: number;
  samples?: number;
  /** Standard deviations that stand in place of the defaults, as in the plan. */
  spreads?: Partial<Spreads>;
}

export interface Reckoning {
  /** Stage by the numbers alone at `nowS`. */
  stage: 'charging' | 'tapering' | 'resting' | 'check-due';
  groups: { restVolts: number; soc: number; polarisationVolts: number; clipVolts: number }[];
  /** Amps now by the model or the last reading; negative while discharging. */
  amps: number;
  terminalVolts: number;
  deliveredAh: number;
  plannedAh: number;
  /** Step that runs, or that ended last and waits for the swap to the next one. */
  stepIndex: number;
  /**
   * End of current of that step, reached or expected, s. Later than `nowS` while it runs; at or before `nowS` with
   * another step to come: the charge waits for the swap, no current flows, and the next step is reckoned to begin at
   * `nowS` plus its hands-on time.
   */
  stepEndS: number;
  /** Instants from clip-on, s. */
  taperAtS: number | null;
  currentEndS: number;
  restEndS: number;
  readyS: Band;
  segments: Segment[];
  laggingGroup: number | null;
  lagVolts: number;
  /** What the plan expects at the instant of the last reading, to stand beside it; null without one. */
  expected: { s: number; terminalVolts: number; amps: number; celsius: number } | null;
  dominant: Doubt;
  /**
   * How likely a reading between the clips this far from the reckoned volts is, by the samples and the meters: 0…1, the last
   * one with volts and amps; null without one. Below some hundredths no sample explains it.
   */
  readingChance: number | null;
  /** What is odd about the latest readings; null: nothing, or it has passed. */
  odd: OddSeen | null;
  /** What this charge has taught; null each where its readings have not told. */
  learned: {
    /** Mean of the groups, Ah. */
    capacityAh: Learned | null;
    /** R0 + R1, mean of the groups, ohm. */
    longOhm: Learned | null;
    /** Of the charger that ran last, ohm. */
    leadOhm: Learned | null;
  };
}
