import type { Looks, TerminalLook } from './looks';
import type { Circuit, Observation } from './observations';
import { ODD_OFF, type OddLook } from './odd-run';
import type { Look, ParticleSet } from './particle-set';

/** From one reading to the next the model's error may move by this share of itself beside what it forgets. */
const JUMP_SHARE = 0.5;
/** A jump from the reading before, in standard deviations. */
const JUMP_OFF = 6;

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
  const expected = look.volts - circuit.count * set.meanOff(look);
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
