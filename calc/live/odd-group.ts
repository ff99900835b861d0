import { slopeAtSoc, voltsAtSoc } from '../curve/ocv';
import type { PlanModel } from '../plan/plan-model';
import { LIVE_SPREADS } from './live-spreads';
import type { Observation } from './observations';
import { ODD_OFF, type OddLook } from './odd-run';

/**
 * The group that runs ahead of the others (or behind) by more than its start, its resistance and its capacity may make it:
 * each against the middle of the others, so that one does not shift them all.
 */
export function oddGroup(model: PlanModel, at: Observation): OddLook | null {
  const { circuit } = at;
  const volts = at.kept.reading.groupVolts;
  if (circuit === null || circuit.lane.step.way !== 'terminals' || volts === null) return null;
  if (volts.length !== model.groups.length || volts.length < 2 || circuit.groups.length !== volts.length) return null;
  const { knot, lane } = circuit;
  const reckoned = volts.map(
    (_, group) =>
      voltsAtSoc(model.curve, knot.state.soc[group]!) +
      knot.state.over[group]! +
      lane.sign * knot.amps * model.groups[group]!.ohmicResistanceOhm,
  );
  const offs = volts.map((one, group) => one - reckoned[group]!);
  const against = offs.map((off, group) => off - median(offs.filter((_, other) => other !== group)));
  const ahead = against.map((off) => off * lane.sign);
  // Of two groups one is ahead of the other as far as that lags: the one ahead is named.
  const size = volts.length === 2 ? ahead : ahead.map(Math.abs);
  const group = size.indexOf(Math.max(...size));
  const own = model.groups[group]!;
  const through = Math.abs(knot.state.over[group]! + lane.sign * knot.amps * own.ohmicResistanceOhm);
  const moved = Math.abs(at.movedAh[group]!) / own.capacityAh;
  const sd = Math.hypot(
    Math.SQRT2 * model.spreads.readingVolts,
    LIVE_SPREADS.groupResistanceRelative * through,
    LIVE_SPREADS.groupCapacityRelative * moved * slopeAtSoc(model.curve, knot.state.soc[group]!),
  );
  const off = size[group]! / (sd * Math.sqrt(1 + 1 / (volts.length - 1)));
  if (off < ODD_OFF) return null;
  const kind = ahead[group]! > 0 ? 'group-ahead' : 'unexplained';
  return { kind, quantity: 'group-volts', group, seen: volts[group]!, expected: volts[group]! - against[group]!, off };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((one, other) => one - other);
  const middle = sorted.length / 2;
  return sorted.length % 2 === 1 ? sorted[Math.floor(middle)]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}
