import type { Reckoning } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import type { LivePast, LiveRound } from './live-rounds';
import { restVolts } from './module-state';
import type { KeptReading } from './thin-readings';
import { socsOf, withSeenDifferences } from './rest-readings';

/** A lag below this is noise, V. */
const LAG_LEAST_VOLTS = 0.001;

export interface LiveGroups {
  groups: Reckoning['groups'];
  laggingGroup: number | null;
  lagVolts: number;
}

/** Each group at `nowS`, and the one that lags behind the one that leads. */
export function toGroups(
  model: PlanModel,
  kept: readonly KeptReading[],
  past: LivePast,
  current: LiveRound,
  flowing: boolean,
  seenAtRest: readonly number[] | null,
): LiveGroups {
  const reckoned = restVolts(model, past.state.soc);
  const rest = seenAtRest ? [...seenAtRest] : withSeenDifferences(reckoned, seenUnderCurrent(model, kept, current));
  const soc = socsOf(model, rest);
  const groups = rest.map((volts, group) => ({
    restVolts: volts,
    soc: soc[group]!,
    polarisationVolts: past.state.over[group]!,
    clipVolts: volts + past.state.over[group]! + (flowing ? ohmicVolts(model, current, group) : 0),
  }));
  // Side by side or one after the other, groups stand apart by design; only one current through all makes a laggard.
  const together =
    current.lanes[0]!.touched.length === model.groups.length && current.lanes[0]!.step.way !== 'paralleled';
  if (!together || rest.length < 2) return { groups, laggingGroup: null, lagVolts: 0 };
  const up = current.lanes[0]!.sign > 0;
  const last = up ? Math.min(...rest) : Math.max(...rest);
  const lagVolts = Math.max(...rest) - Math.min(...rest);
  return { groups, laggingGroup: lagVolts < LAG_LEAST_VOLTS ? null : rest.indexOf(last), lagVolts };
}

function ohmicVolts(model: PlanModel, current: LiveRound, group: number): number {
  return current.lanes.reduce((sum, lane, at) => {
    if (!lane.step.groupIndexes.includes(group) || current.pasts[at]!.endedAtS !== null) return sum;
    const amps = current.pasts[at]!.amps / (lane.step.way === 'paralleled' ? lane.step.groupIndexes.length : 1);
    return sum + lane.sign * amps * model.groups[group]!.ohmicResistanceOhm;
  }, 0);
}

/** The last reading of all groups while current went through all of them, beside what was reckoned for that moment. */
function seenUnderCurrent(
  model: PlanModel,
  kept: readonly KeptReading[],
  current: LiveRound,
): { volts: readonly number[]; reckoned: readonly number[] } | null {
  const lane = current.lanes[0]!;
  if (lane.step.way !== 'terminals' || lane.step.groupIndexes.length !== model.groups.length) return null;
  const until = Math.min(current.endedAtS ?? Infinity, current.stretches[current.stretches.length - 1]?.toS ?? 0);
  const { knots } = current.pasts[0]!;
  const knot = knots.findLast(({ index }) => {
    const { reading } = kept[index]!;
    return reading.groupVolts?.length === model.groups.length && reading.s <= until;
  });
  if (!knot) return null;
  const reckoned = restVolts(model, knot.state.soc).map(
    (volts, group) => volts + knot.state.over[group]! + lane.sign * knot.amps * model.groups[group]!.ohmicResistanceOhm,
  );
  return { volts: kept[knot.index]!.reading.groupVolts!, reckoned };
}
