/**
 * What the bench plan's solvers take and give. Seconds count from the moment of planning: 0 is now, the past is negative.
 */

/** A stretch of time; it ends after it begins. */
export interface Stretch {
  fromS: number;
  toS: number;
}

/** One way to carry a charge out: on these channels, that long. */
export interface BenchAlternative {
  /** Indices of the channels it holds together. */
  channels: number[];
  /** How long it holds them: the median, s. */
  busyS: number;
  /** From the clip-on until the module is ready, rest and check included: the median, s. */
  readyS: number;
  /** The same at its 90th percentile, which guards the due time, s. */
  guardS: number;
  /** When it may be clipped on: ascending, apart from each other. */
  mayStart: Stretch[];
}

/** A charge to be given a channel and a time. */
export interface BenchJob {
  id: string;
  /** When it is due; null: whenever. */
  dueS: number | null;
  /** Of each second late; 0 or more. */
  weight: number;
  alternatives: BenchAlternative[];
}

export interface BenchProblem {
  /** Per channel the stretches in which a running or fixed charge has it: ascending, apart from each other. */
  taken: Stretch[][];
  jobs: BenchJob[];
}

export interface BenchPlacement {
  jobId: string;
  /** Index into the job's alternatives. */
  alternative: number;
  startS: number;
}

export interface BenchSolution {
  placements: BenchPlacement[];
  /** Jobs that no channel can carry out at any time they may start. */
  unplaced: string[];
  /** Sum of weight · max(0, start + guardS − dueS), s. */
  weightedTardinessS: number;
  /** When the last module is ready, by the median, s. */
  makespanS: number;
  /** No plan has less weighted tardiness than this, s. */
  boundS: number;
  /** It is the least weighted tardiness, and of those plans the one with the least makespan. */
  proved: boolean;
}

/** How long a solver may go on; it gives the best plan so far when it is told to stop. */
export interface SolveLimits {
  /** Asked every few hundred nodes: true ends the search. calc knows no clock. */
  shouldStop?: () => boolean;
  /** The search ends after so many nodes, so that a run without a clock is the same everywhere. */
  maxNodes?: number;
}

/** A stretch in which one person has nothing of their own to do. */
export interface FillWindow extends Stretch {
  personId: string;
  /** Instants within it at which this person looks in at a charge; each takes `lookInS` off what is done. */
  lookInsS: number[];
}

/** A piece of other work. */
export interface FillWork {
  id: string;
  /** What is left of it by its likely estimate, s: its worth. */
  likelyS: number;
  /** What is left of it by its long estimate, s: it has to fit with this. */
  longS: number;
  /** Worth of a minute. */
  weight: number;
  /** Who can do it. */
  personIds: string[];
  /** The place it needs; null: none. */
  placeId: string | null;
  /** Not before; 0: from now. */
  releaseS: number;
  /** To be over by then; null: whenever. */
  dueS: number | null;
  /** It may be done in parts of at least `leastPartS`, by one person or several, one after the other. */
  splittable: boolean;
  leastPartS: number;
}

export interface FillProblem {
  windows: FillWindow[];
  work: FillWork[];
  /** Stretches in which a place is taken already, by the place's id. */
  placesTaken: Record<string, Stretch[]>;
  lookInS: number;
}

export interface FillPlacement extends Stretch {
  workId: string;
  personId: string;
  /** Index into the problem's windows. */
  window: number;
  /** How much of the long estimate is done in it, s: `toS − fromS` without the look-ins within it. */
  workedS: number;
}

export interface FillSolution {
  placements: FillPlacement[];
  /** Sum of weight · minutes by the likely estimate. */
  weightedMinutes: number;
  /** No plan has more than this. */
  bound: number;
  proved: boolean;
}

/** A look-in that wants somebody. */
export interface WantedLookIn {
  id: string;
  atS: number;
  /** Whose charge it is; null: nobody's. */
  ownerId: string | null;
}

export interface LookInPerson {
  id: string;
  /** When they are in the workshop, breaks taken out. */
  present: Stretch[];
  /** When they have their hands in something that cannot be left (clipping on, a check). */
  busy: Stretch[];
}

export interface LookInGiven {
  lookInId: string;
  /** Null: nobody can. */
  personId: string | null;
  /** Why nobody can: 'away', nobody is present all through it; 'busy', whoever is has their hands in something. */
  nobody: 'away' | 'busy' | null;
}
