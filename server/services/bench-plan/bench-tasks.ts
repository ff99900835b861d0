/** What the bench plan asks of its thread, and what it hears: plain numbers both ways. */
import type { BenchProblem, BenchSolution, FillProblem, FillSolution } from '@/calc/bench/bench-types';
import type { Band, Finish, PlanInput, PlanOption, Way } from '@/calc/plan-types';

/** A charge planned again in its own way, on every channel that can. */
export interface WayInput {
  /** Every channel is free at once, and the clip-on is now: what it takes does not hang on when. */
  input: PlanInput;
  way: Way;
  finish: Finish;
  knownEnd: PlanOption['knownEnd'] | null;
}

/** One way to carry a charge out. */
export interface Alternative {
  optionId: string;
  channelIds: string[];
  /** From the clip-on to the end of current, s. */
  busyS: number;
  /** From the clip-on until it is ready, s. */
  totalS: Band;
}

export interface Alternatives {
  /** Soonest first. */
  options: Alternative[];
  /** Why a channel cannot, by its id. */
  because: Record<string, string>;
}

/** A spare that could be brought close before its pack is read. */
export interface EarlyStart {
  spareId: string;
  /** From the shelf to the usual rest voltage. */
  start: PlanInput;
  /** Rest voltages with which packs have arrived, or may, V: what is still to come is the mean over them. */
  arrivals: number[];
}
export interface EarlyStartFound {
  spareId: string;
  /** What it is brought to, V per group. */
  aimVolts: number;
  /** Null: it rests there already. */
  channelId: string | null;
  takesS: Band;
  /** Mean wait over the arrivals, without the start and after it, s. */
  withoutS: number;
  thenS: number;
}

export type BenchTask =
  | { kind: 'way'; ask: WayInput }
  | { kind: 'option'; ask: WayInput; channelIds: string[] }
  | { kind: 'bench'; problem: BenchProblem; limitMs: number }
  | { kind: 'fills'; problem: FillProblem; limitMs: number }
  | { kind: 'early-starts'; spares: EarlyStart[] };

/** Answer of each kind of task. */
export interface BenchAnswers {
  way: Alternatives;
  option: PlanOption | null;
  bench: BenchSolution;
  fills: FillSolution;
  'early-starts': EarlyStartFound[];
}
export type BenchAnswer = BenchAnswers[keyof BenchAnswers];
