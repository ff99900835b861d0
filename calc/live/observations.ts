import { compileCurve } from '../curve/compiled-curve';
import { curveVolts } from '../curve/ocv';
import type { ChannelParameters } from '../plan-types';
import type { PlanModel } from '../plan/plan-model';
import type { Knot } from './lane-past';
import { movedAfter, type LivePast, type LiveRound } from './live-rounds';
import type { Lane } from './lane';
import { rested } from './module-state';
import { LIVE_SPREADS } from './live-spreads';
import type { KeptReading } from './thin-readings';

/** A reading beside the module as it is reckoned at that instant: all that the samples share. */
export interface Observation {
  kept: KeptReading;
  /** Charge gone into each group by then, Ah. */
  movedAh: number[];
  /** Over-voltage of each group's RC branch by the nominal resistance, V, signed. */
  over: number[];
  /** The circuit that the current runs through; null: at rest, or several at once. */
  circuit: Circuit | null;
  /** The current is over: what is read at the groups is at rest. */
  atRest: boolean;
  /** What the current has warmed the module by so far if no heat has left it, K. */
  ownHeatKelvin: number;
}

export interface Circuit {
  lane: Lane;
  channel: ChannelParameters;
  knot: Knot;
  /** Groups in series between the clips; several that are joined are one. */
  count: number;
  groups: number[];
  /** Each group's share in the mean. */
  shares: number[];
  /** What the source gives where no voltage limit rules, by its amps and watts; null: a resistor rules. */
  fullAmps: number | null;
  /** R0 a group, nominal, ohm. */
  ohmicOhm: number;
  /** Link resistance a group, ohm. */
  linkOhm: number;
  /** Mean of U over the groups less U of their mean charge, nominal, V: what unequal groups add. */
  unevenVolts: number;
}

/** All kept readings up to now beside the reckoned module, in order of time. */
export function observationsOf(model: PlanModel, past: LivePast, kept: readonly KeptReading[]): Observation[] {
  const found = new Map<number, Observation>();
  let heat = 0;
  let before: { s: number; amps: number } | null = null;
  const warmed = (knot: { s: number; amps: number }): number => {
    if (before)
      heat += ((before.amps ** 2 + knot.amps ** 2) / 2) * Math.max(0, knot.s - before.s) * heatPerAmpSquared(model);
    before = knot;
    return heat;
  };
  for (const round of past.begun) {
    if (round.lanes.length !== 1) continue;
    const lane = round.lanes[0]!;
    const channel = model.input.channels.find((one) => one.channelId === lane.step.channelIds[0]);
    const circuitOf = channel && circuitsOf(model, lane, channel);
    for (const stretch of round.stretches.slice(0, 1))
      warmed({ s: stretch.fromS, amps: round.pasts[0]!.knots[0]?.amps ?? 0 });
    for (const knot of round.pasts[0]!.knots) {
      const reading = kept[knot.index]!;
      found.set(knot.index, {
        kept: reading,
        movedAh: movedAfter(model, round.movedBeforeAh, lane, knot.deliveredAh),
        over: knot.state.over,
        circuit: circuitOf && !knot.over && !knot.paused ? circuitOf(knot) : null,
        atRest: knot.over,
        ownHeatKelvin: warmed({ s: reading.s, amps: knot.amps }),
      });
    }
  }
  const last = past.begun[past.begun.length - 1];
  kept.forEach((reading) => {
    if (found.has(reading.index)) return;
    found.set(reading.index, betweenOrAfter(model, past, last, reading, heat));
  });
  return [...found.values()].sort((one, other) => one.kept.index - other.kept.index);
}

/** A reading outside all stretches: after the last of them it is at rest, between two of them it says nothing but its warmth. */
function betweenOrAfter(
  model: PlanModel,
  past: LivePast,
  last: LiveRound | undefined,
  reading: KeptReading,
  ownHeatKelvin: number,
): Observation {
  const final = last !== undefined && past.begun.length === past.rounds.length && !last.open;
  const end = last?.stretches[last.stretches.length - 1];
  const atRest = final && end !== undefined && reading.s >= Math.min(end.toS, last.endedAtS ?? Infinity);
  const state = atRest ? rested(model, restStart(last), reading.s) : past.state;
  return { kept: reading, movedAh: past.movedAh, over: state.over, circuit: null, atRest, ownHeatKelvin };
}

const restStart = (round: LiveRound) => {
  // Of clips side by side each group was left by its own.
  const state = round.pasts[0]!.endState;
  const over = [...state.over];
  round.lanes.forEach((lane, at) => {
    for (const group of lane.touched) over[group] = round.pasts[at]!.endState.over[group]!;
  });
  return { ...state, over };
};

/** The circuit of a lane at each of its knots. */
function circuitsOf(model: PlanModel, lane: Lane, channel: ChannelParameters): (knot: Knot) => Circuit {
  const groups = lane.step.groupIndexes;
  const joined = lane.step.way === 'paralleled';
  const capacity = groups.reduce((sum, group) => sum + model.groups[group]!.capacityAh, 0);
  const shares = groups.map((group) => (joined ? model.groups[group]!.capacityAh / capacity : 1 / groups.length));
  const ohms = groups.map((group) => model.groups[group]!.ohmicResistanceOhm);
  const count = joined ? 1 : groups.length;
  const ohmicOhm = joined
    ? 1 / ohms.reduce((sum, ohm) => sum + 1 / ohm, 0)
    : ohms.reduce((sum, ohm) => sum + ohm, 0) / ohms.length;
  const linkOhm = lane.step.way === 'terminals' ? model.input.module.linkResistanceOhm / groups.length : 0;
  const { setAmps } = lane.step;
  const curve = compileCurve(model.curve);
  return (knot) => {
    let meanSoc = 0;
    let meanVolts = 0;
    for (let at = 0; at < groups.length; at += 1) {
      const soc = knot.state.soc[groups[at]!]!;
      meanSoc += shares[at]! * soc;
      meanVolts += shares[at]! * curveVolts(curve, soc);
    }
    return {
      lane,
      channel,
      knot,
      count,
      groups,
      shares,
      fullAmps: setAmps === null ? null : Math.min(setAmps, (channel.maxWatts ?? Infinity) / (count * meanVolts)),
      ohmicOhm,
      linkOhm,
      unevenVolts: joined ? 0 : meanVolts - curveVolts(curve, meanSoc),
    };
  };
}

/** What one ampere squared warms the module by in a second if no heat leaves it, K/(A²s). */
function heatPerAmpSquared(model: PlanModel): number {
  const rates = model.groups.map(
    (group) =>
      (group.ohmicResistanceOhm + group.polarisationResistanceOhm) /
      (LIVE_SPREADS.heatJoulePerKelvinAh * group.capacityAh),
  );
  return Math.max(...rates);
}
