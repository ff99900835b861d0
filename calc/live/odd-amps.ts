import { isFull, type Looks } from './looks';
import type { Circuit, Observation } from './observations';
import { ODD_OFF, type OddLook } from './odd-run';
import type { ParticleSet } from './particle-set';

/** Below this share of the full current the model has a taper. */
const FULL_SHARE = 0.97;

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
  const look = looks.terminal(held, circuit, { keptVolts: 1, smoothVolts: 1, keptCelsius: 1 });
  return look !== null && set.offOf(look, 0).level * circuit.lane.sign < -ODD_OFF;
}
