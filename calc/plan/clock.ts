import type { Segment, StepKind, WorkshopParameters } from '../plan-types';
import type { DraftStep } from './draft';

const PHASES: readonly StepKind[] = ['pre-level', 'bulk', 'trim'];

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
 * Levelling comes first, then the bulk, then the trim; steps of one phase on different channels run side by side, each lane
 * clipped on after the other. Busbars come off before the first current and go on again in the rest.
 */
export function layOut(input: ClockInput): Clock {
  const { steps, workshop, busbarsOff, clipOnAtS, seconds } = input;
  const { clipOnS, clipOffS, checkS, busbarsS } = workshop;
  const freeS = (step: DraftStep): number => Math.max(0, (step.channel?.freeInS ?? 0) - clipOnAtS);
  const firstPhase = phasesOf(steps)[0] ?? [];
  const queueS =
    firstPhase.length === 0 ? 0 : Math.min(...lanesOf(steps, firstPhase).map(([at]) => freeS(steps[at!]!)));

  const startS = steps.map(() => 0);
  const stopS = steps.map(() => 0);
  let connects = 0;
  let clock = queueS + (busbarsOff ? busbarsS : 0);
  phasesOf(steps).forEach((phase, phaseAt) => {
    let ready = clock + (phaseAt > 0 ? clipOffS : 0);
    for (const lane of lanesOf(steps, phase)) {
      let laneS = Math.max(ready, freeS(steps[lane[0]!]!));
      lane.forEach((at, place) => {
        if (place > 0) laneS += clipOffS;
        laneS += clipOnS;
        connects += 1;
        if (place === 0) ready = laneS;
        startS[at] = laneS;
        laneS += seconds[at]!;
        stopS[at] = laneS;
      });
      clock = Math.max(clock, laneS);
    }
  });
  const currentEndS = steps.length === 0 ? clock : Math.max(...stopS);
  const offS = clipOffS + (busbarsOff ? busbarsS : 0);
  const restEndS = currentEndS + Math.max(input.restS, offS);
  return {
    queueS,
    startS,
    stopS,
    currentStartS: steps.length === 0 ? clock : Math.min(...startS),
    currentEndS,
    restEndS,
    readyS: restEndS + checkS,
    handsOnS: connects * (clipOnS + clipOffS) + (busbarsOff ? 2 * busbarsS : 0) + checkS,
  };
}

/** The likely run as the ribbon draws it: the lane that ends last of each phase, the hands between, rest and check. */
export function toSegments(input: ClockInput, clock: Clock): Segment[] {
  const { steps } = input;
  const segments: Segment[] = [];
  const push = (kind: Segment['kind'], fromS: number, toS: number): void => {
    if (toS - fromS > 1e-6) segments.push({ kind, fromS, toS });
  };
  push('queue', 0, clock.queueS);
  let at = clock.queueS;
  for (const phase of phasesOf(steps)) {
    const lanes = lanesOf(steps, phase);
    const end = (lane: number[]): number => clock.stopS[lane[lane.length - 1]!]!;
    const last = lanes.reduce((latest, lane) => (end(lane) > end(latest) ? lane : latest));
    for (const index of last) {
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
  }
  push('rest', clock.currentEndS, clock.restEndS);
  push('check', clock.restEndS, clock.readyS);
  return segments;
}

/** Indexes of the steps by phase, in order. */
function phasesOf(steps: DraftStep[]): number[][] {
  return PHASES.map((kind) => steps.flatMap((step, at) => (step.kind === kind ? [at] : []))).filter(
    (phase) => phase.length > 0,
  );
}

/** Steps of a phase by what they hang on: one lane per channel or resistor. */
function lanesOf(steps: DraftStep[], phase: number[]): number[][] {
  const lanes = new Map<string, number[]>();
  for (const at of phase) {
    const key = steps[at]!.channel?.channelId ?? steps[at]!.resistorId ?? '';
    lanes.set(key, [...(lanes.get(key) ?? []), at]);
  }
  return [...lanes.values()];
}
