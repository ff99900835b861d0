/** What the thread of the waits is asked, and what it answers: plain numbers both ways. */
export interface CompareTask {
  kind: 'compare';
  /** Lengths of two periods, ms; neither is empty. */
  before: number[];
  then: number[];
  seed: number;
}
export interface CompareAnswer {
  /** Difference of the medians, then − before, ms, with its 95 % interval, and the rank test's p. */
  value: number;
  low: number;
  high: number;
  p: number;
}

export type WaitsTask = CompareTask;
export interface WaitsAnswers {
  compare: CompareAnswer;
}
export type WaitsAnswer = WaitsAnswers[keyof WaitsAnswers];
