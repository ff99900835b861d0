import type { ReckonInput, RunStretch } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import { laneReadings, type LanePast, type LaneReading, type Stretch } from './lane-past';
import { lanePast } from './live-past';
import { laneOf, liveRounds } from './live-model';
import type { Lane } from './lane';
import { overPauses } from './pauses';
import { rested, stateAtStart, type ModuleState } from './module-state';

/** Steps that were begun together, and what they have done. */
export interface LiveRound {
  /** Indexes of the option's steps. */
  steps: number[];
  lanes: Lane[];
  pasts: LanePast[];
  /** Stretches up to now. */
  stretches: Stretch[];
  /** Current may flow now. */
  open: boolean;
  /** Last current so far or reached end, s; while it runs: null. */
  endedAtS: number | null;
  /** Charge that had gone into each group before, Ah. */
  movedBeforeAh: number[];
}

/** What a replay needs. */
export type ReplayInput = Pick<ReckonInput, 'option' | 'runs' | 'currentOffAtS'> & {
  readings: readonly LaneReading[];
};

export interface LivePast {
  rounds: number[][];
  /** Begun ones, in order. */
  begun: LiveRound[];
  /** At `nowS`. */
  state: ModuleState;
  /** Charge gone into each group at its terminals, Ah; out of it: negative. Levelling through a resistor not counted. */
  movedAh: number[];
  /** As the option counts its ampere-hours. */
  deliveredAh: number;
}

/** Replays a charge from its clip-on to `nowS`: stretches, readings, and the model between. */
export function livePast(model: PlanModel, input: ReplayInput, nowS: number): LivePast {
  const { option } = input;
  const rounds = liveRounds(option.steps);
  const off = input.currentOffAtS ?? Infinity;
  const runs = input.runs
    .filter((run) => run.fromS <= nowS && run.fromS < off)
    .map((run) => ({ ...run, toS: run.toS === null && off === Infinity ? null : Math.min(run.toS ?? Infinity, off) }))
    .sort((a, b) => a.fromS - b.fromS);
  const past: LivePast = {
    rounds,
    begun: [],
    state: stateAtStart(model),
    movedAh: model.groups.map(() => 0),
    deliveredAh: 0,
  };
  const lastRound = Math.max(0, ...runs.map((run) => roundOf(rounds, run)));
  for (let round = 0; round <= lastRound; round += 1) {
    const own = runs.filter((run) => roundOf(rounds, run) === round);
    const untilS = round < lastRound ? Math.max(past.state.s, ...own.map((run) => run.toS ?? nowS)) : nowS;
    liveRound(model, input, past, round, own, Math.min(untilS, nowS), round === lastRound && off < Infinity);
  }
  past.state = rested(model, past.state, nowS);
  return past;
}

function liveRound(
  model: PlanModel,
  input: Pick<ReplayInput, 'option' | 'readings'>,
  past: LivePast,
  round: number,
  runs: RunStretch[],
  untilS: number,
  saidOff: boolean,
): void {
  const { option } = input;
  const steps = past.rounds[round]!;
  const start = past.state;
  const lanes = steps.map((at) => laneOf(model, option.steps[at]!, at, start.soc));
  const stretches = runs.map((run) => ({ fromS: run.fromS, toS: run.toS ?? Infinity }));
  const total = lanes.reduce((sum, lane) => sum + (lane.step.setAmps ?? 0), 0);
  const pasts = lanes.map((lane) => {
    const share = lanes.length === 1 || total === 0 ? 1 / lanes.length : (lane.step.setAmps ?? 0) / total;
    const seen = laneReadings(input.readings, share, lanes.length === 1);
    // Of clips side by side it is not known which of them was switched off last.
    const channel = model.input.channels.find((one) => one.channelId === lane.step.channelIds[0]);
    const meant = overPauses(seen, lane.step.setAmps, channel?.duty ?? 1);
    return lanePast(model, lane, start, stretches, meant, untilS, saidOff && lanes.length === 1);
  });
  const movedBeforeAh = [...past.movedAh];
  past.state = merged(model, start, lanes, pasts, untilS);
  lanes.forEach((lane, at) => addMoved(model, past, lane, pasts[at]!.deliveredAh));
  const last = stretches[stretches.length - 1];
  const done = pasts.every((one) => one.endedAtS !== null);
  past.begun.push({
    steps,
    lanes,
    pasts,
    stretches: stretches.map(({ fromS, toS }) => ({ fromS, toS: Math.min(toS, untilS) })),
    open: last !== undefined && last.toS > untilS && !done,
    endedAtS: done ? Math.max(...pasts.map((one) => one.endedAtS!)) : null,
    movedBeforeAh,
  });
}

function merged(model: PlanModel, start: ModuleState, lanes: Lane[], pasts: LanePast[], toS: number): ModuleState {
  const state = rested(model, start, toS);
  const soc = [...state.soc];
  const over = [...state.over];
  lanes.forEach((lane, at) => {
    for (const group of lane.touched) {
      soc[group] = pasts[at]!.state.soc[group]!;
      over[group] = pasts[at]!.state.over[group]!;
    }
  });
  return { s: toS, soc, over };
}

function addMoved(model: PlanModel, past: LivePast, lane: Lane, ampHours: number): void {
  if (lane.step.kind === 'pre-level') return;
  past.deliveredAh += ampHours;
  past.movedAh = movedAfter(model, past.movedAh, lane, ampHours);
}

/** Charge gone into each group at its terminals after so many ampere-hours of a lane, Ah. */
export function movedAfter(model: PlanModel, before: readonly number[], lane: Lane, ampHours: number): number[] {
  const moved = [...before];
  if (lane.step.kind === 'pre-level') return moved;
  const groups = lane.step.groupIndexes;
  const capacity = groups.reduce((sum, group) => sum + model.groups[group]!.capacityAh, 0);
  for (const group of groups) {
    const share = lane.step.way === 'paralleled' ? model.groups[group]!.capacityAh / capacity : 1;
    moved[group]! += lane.sign * ampHours * share;
  }
  return moved;
}

function roundOf(rounds: number[][], run: RunStretch): number {
  const found = rounds.findIndex((steps) => steps.includes(run.stepIndex ?? 0));
  return Math.max(0, found);
}
