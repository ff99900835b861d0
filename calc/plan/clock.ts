import type { Segment, WorkshopParameters } from '../plan-types';
import type { DraftStep } from './draft';

export interface ClockInput {
  steps: DraftStep[];
  workshop: WorkshopParameters;
  busbarsOff: boolean;
  /** Moment of the clip-on that is wished, s from now. */
  clipOnAtS: number;
  restS: number;
  /** Seconds of current of each step. */
  seconds: number[];
}

export interface Clock {
  queueS: number;
  /** Of each step, s from the clip-on. */
  startS: number[];
  stopS: number[];
  currentStartS: number;
  currentEndS: number;
  restEndS: number;
  readyS: number;
  handsOnS: number;
}

/**
 * Lays the steps on the clock: wait for the channels, hands, current, swaps of the clips, rest and check.
 *
 * Steps that belong together begin together, on channels of their own; the next ones begin when a hand has swapped all clips,
 * which waits for the last of them. Busbars come off before the first current and go on again in the rest.
 */
export function layOut(input: ClockInput): Clock {
  const { steps, workshop, busbarsOff, clipOnAtS, seconds } = input;
  const { clipOnS, clipOffS, checkS, busbarsS } = workshop;
  const rounds = roundsOf(steps);
  const freeS = (round: number[]): number =>
    Math.max(0, ...round.map((at) => (steps[at]!.channel?.freeInS ?? 0) - clipOnAtS));
  const queueS = rounds.length === 0 ? 0 : freeS(rounds[0]!);

  const startS = steps.map(() => 0);
  const stopS = steps.map(() => 0);
  let clock = queueS + (busbarsOff ? busbarsS : 0);
  let clipped = 0;
  for (const round of rounds) {
    const begins = Math.max(clock + clipped * clipOffS, freeS(round)) + round.length * clipOnS;
    for (const at of round) {
      startS[at] = begins;
      stopS[at] = begins + seconds[at]!;
    }
    clock = Math.max(...round.map((at) => stopS[at]!));
    clipped = round.length;
  }
  const offS = clipped * clipOffS + (busbarsOff ? busbarsS : 0);
  const restEndS = clock + Math.max(input.restS, offS);
  return {
    queueS,
    startS,
    stopS,
    currentStartS: startS[0] ?? clock,
    currentEndS: clock,
    restEndS,
    readyS: restEndS + checkS,
    handsOnS: steps.length * (clipOnS + clipOffS) + (busbarsOff ? 2 * busbarsS : 0) + checkS,
  };
}

/** The likely run as the ribbon draws it: of steps side by side the one that ends last, the hands between, rest and check. */
export function toSegments(input: ClockInput, clock: Clock): Segment[] {
  const { steps } = input;
  const segments: Segment[] = [];
  const push = (kind: Segment['kind'], fromS: number, toS: number): void => {
    if (toS - fromS > 1e-6) segments.push({ kind, fromS, toS });
  };
  push('queue', 0, clock.queueS);
  let at = clock.queueS;
  for (const round of roundsOf(steps)) {
    const index = round.reduce((last, one) => (clock.stopS[one]! > clock.stopS[last]! ? one : last));
    const step = steps[index]!;
    const startS = clock.startS[index]!;
    const stopS = clock.stopS[index]!;
    push('hands', at, startS);
    const share = step.voltageLimitAtS === null || step.seconds === 0 ? 1 : step.voltageLimitAtS / step.seconds;
    const taperS = startS + (stopS - startS) * Math.min(1, share);
    push('cc', startS, taperS);
    push('taper', taperS, stopS);
    at = stopS;
  }
  push('rest', clock.currentEndS, clock.restEndS);
  push('check', clock.restEndS, clock.readyS);
  return segments;
}

/** Indexes of the steps that begin together, in order. */
export function roundsOf(steps: readonly Pick<DraftStep, 'together'>[]): number[][] {
  const rounds: number[][] = [];
  steps.forEach((step, at) => {
    if (step.together && rounds.length > 0) rounds[rounds.length - 1]!.push(at);
    else rounds.push([at]);
  });
  return rounds;
}
