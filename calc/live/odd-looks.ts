import { slopeAtSoc, voltsAtSoc } from '../curve/ocv';
import type { PlanModel } from '../plan/plan-model';
import { SAMPLE_AXES } from '../plan/samples';
import { LIVE_SPREADS } from './live-spreads';
import { isFull, type Looks, type TerminalLook } from './looks';
import type { Circuit, Observation } from './observations';
import { ODD_OFF, type OddLook } from './odd-run';
import type { Look, ParticleSet } from './particle-set';

/** From one reading to the next the model's error may move by this share of itself beside what it forgets. */
const JUMP_SHARE = 0.5;
/** A jump from the reading before, in standard deviations. */
const JUMP_OFF = 6;
/** Below this share of the full current the model has a taper. */
const FULL_SHARE = 0.97;
const TEMPERATURE = SAMPLE_AXES.indexOf('temperature');

/** How far the voltage between the clips is off. */
export const offOfVolts = (set: ParticleSet, looks: Looks, look: Look, at: Observation, circuit: Circuit) =>
  set.offOf(look, JUMP_SHARE * looks.overSd(at, circuit));

/** The voltage between the clips: null where it is as it should be. */
export function oddVolts(
  set: ParticleSet,
  look: TerminalLook,
  { level, jump }: ReturnType<ParticleSet['offOf']>,
  at: Observation,
  circuit: Circuit,
): OddLook | null {
  const jumped = jump !== null && Math.abs(jump) >= JUMP_OFF;
  if (Math.abs(level) < ODD_OFF && !jumped) return null;
  const up = (jumped ? jump : level) * circuit.lane.sign > 0;
  const expected = set.moments(look.expected).mean;
  const off = Math.max(Math.abs(level), jumped ? Math.abs(jump) : 0);
  if (at.kept.reading.terminalVolts === null) {
    // Read were the amps alone: in a taper they say how far the set voltage stands above the module.
    const amps = circuit.knot.amps;
    const due = Math.max(0, amps + (circuit.lane.sign * (look.volts - expected)) / ohmOf(circuit));
    return {
      kind: 'stuck-current',
      quantity: 'amps',
      group: null,
      seen: amps,
      expected: Math.min(due, circuit.knot.dueAmps || due),
      off,
    };
  }
  const kind = jumped || (jump === null && up) ? 'voltage-jump' : 'unexplained';
  return { kind, quantity: 'terminal-volts', group: null, seen: look.volts, expected, off };
}

const ohmOf = ({ count, ohmicOhm, linkOhm, channel }: Circuit): number =>
  Math.max(1e-4, count * (ohmicOhm + linkOhm) + channel.leadResistanceOhm);

/** The current: none while some is due, or another than the source is set to where no voltage limit explains it. */
export function oddAmps(set: ParticleSet, looks: Looks, at: Observation, circuit: Circuit): OddLook | null {
  const { knot, lane } = circuit;
  const { amps } = at.kept;
  if (amps === null) return null;
  const found = { quantity: 'amps', group: null, seen: amps, expected: knot.dueAmps } as const;
  if (knot.noCurrent) return { ...found, kind: 'no-current', off: Infinity };
  const setAmps = lane.step.setAmps;
  if (setAmps === null || lane.step.setVolts === null) return null;
  const look = looks.amps(at);
  if (look === null) return null;
  const off = set.offOf(look, 0).level;
  // As many as set although the module would take fewer by now: odd where it stands past the set voltage.
  if (isFull(circuit, amps) && knot.dueAmps < (circuit.fullAmps ?? 0) * FULL_SHARE)
    return pastSet(set, looks, at, circuit) ? { ...found, kind: 'stuck-current', off: Math.abs(off) } : null;
  if (Math.abs(off) < ODD_OFF) return null;
  // Fewer: in a taper the voltage says whether that is right.
  const volts = at.kept.reading.terminalVolts;
  if (!isFull(circuit, amps) && (volts === null || knot.tapering || lane.atSetVolts(volts, amps))) return null;
  return { ...found, kind: 'stuck-current', off: Math.abs(off) };
}

/** By the samples the module stands past the set voltage at this current. */
function pastSet(set: ParticleSet, looks: Looks, at: Observation, circuit: Circuit): boolean {
  const held: Observation = {
    ...at,
    kept: { ...at.kept, reading: { ...at.kept.reading, terminalVolts: circuit.lane.step.setVolts } },
  };
  const look = looks.terminal(held, circuit, { keptVolts: 1, keptCelsius: 1 });
  return look !== null && set.offOf(look, 0).level * circuit.lane.sign < -ODD_OFF;
}

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

/** The first temperature of the charge, which later ones are held against. */
export interface WarmFrom {
  s: number;
  celsius: number;
  ownHeatKelvin: number;
}

/**
 * Warmer than the current's own heat and the room make it. Held against the first reading of the charge and not against what
 * was learned since: a slow rise would teach itself away.
 */
export function oddCelsius(model: PlanModel, set: ParticleSet, at: Observation, from: WarmFrom | null): OddLook | null {
  const { celsius } = at.kept.reading;
  if (celsius === null) return null;
  const start = from ?? { s: 0, celsius: model.basis.celsius, ownHeatKelvin: 0 };
  const room = model.input.celsius;
  const fromRoom = Math.max(0, room - start.celsius) * (1 - Math.exp(-(at.kept.s - start.s) / LIVE_SPREADS.roomS));
  const expected = start.celsius + (at.ownHeatKelvin - start.ownHeatKelvin) + fromRoom;
  const startSd =
    from === null
      ? model.spreads.temperatureCelsius * Math.sqrt(set.moments((sample) => sample.draws[TEMPERATURE]!).variance)
      : LIVE_SPREADS.celsius;
  const off = (celsius - expected) / Math.hypot(startSd, LIVE_SPREADS.celsius, LIVE_SPREADS.celsiusDrift);
  if (off < ODD_OFF) return null;
  return { kind: 'too-warm', quantity: 'celsius', group: null, seen: celsius, expected, off };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((one, other) => one - other);
  const middle = sorted.length / 2;
  return sorted.length % 2 === 1 ? sorted[Math.floor(middle)]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}
