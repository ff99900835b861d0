import { isGiven } from '../require';
import type { StepInput } from '../types';
import { coulombsToEmf, coulombsToGroupVolts } from './reach';
import type { SeriesLoop } from './series-loop';

/** What the rest-voltage stops and the voltage limits come to, in charge. */
export interface Limit {
  /** Charge at which the first rest-voltage stop is met, C; Infinity without one. */
  atCoulombs: number;
  /** Branch whose own rest voltage that stop is; null where it is the sum's. */
  byGroup: number | null;
  /** Charge at which a voltage limit lets no more current through, C; Infinity without one. */
  endCoulombs: number;
  /** Branch that is held there; null where the set voltage rules. */
  endBranch: number | null;
  /** Known beforehand to end never: no need to integrate. */
  neverEnds: boolean;
  unreachableReason: string | null;
  /** The start is already past the target by more than its tolerance. */
  pastReason: string | null;
}

/** Works out, before any integration, where a step would stop and whether its limits let it get there. */
export function findLimit(input: StepInput, loop: SeriesLoop): Limit {
  const { stop, source } = input;
  const groupRelaxed = stop.groupRelaxedVolts ?? null;
  const target = stop.relaxedVolts ?? null;
  const ofSum = target === null ? Infinity : coulombsToEmf(loop, target - loop.sense * stop.toleranceVolts);
  const ofGroup = groupRelaxed === null ? null : coulombsToGroupVolts(loop, groupRelaxed);
  const first = ofGroup && ofGroup.coulombs < ofSum ? ofGroup : null;
  const atCoulombs = first ? Math.max(0, first.coulombs) : ofSum;

  const set = !isGiven(source.setVolts) ? Infinity : coulombsToEmf(loop, source.setVolts);
  const held = !isGiven(source.heldGroupVolts) ? null : coulombsToGroupVolts(loop, source.heldGroupVolts);
  const heldFirst = held !== null && held.coulombs < set;
  const endCoulombs = heldFirst ? Math.max(0, held.coulombs) : set;

  const blocked = atCoulombs > 0 && atCoulombs >= endCoulombs * (1 - 1e-12);
  const unreachableReason = blocked || atCoulombs === Infinity ? explain(input, loop, endCoulombs, heldFirst) : null;
  const mayEndOtherwise =
    isGiven(stop.groupVolts) || isGiven(stop.maxSeconds) || ((stop.cutoffAmps ?? 0) > 0 && hasVoltageLimit(input));
  // Over-voltages against the current can lift the rest voltage past the set voltage for a while: then integrate.
  const leaning = loop.classStart.some((over) => over < 0);
  const neverEnds = !mayEndOtherwise && (atCoulombs === Infinity || (blocked && !leaning));
  const pastReason = atCoulombs === 0 ? explainPast(input, loop) : null;
  return {
    atCoulombs,
    byGroup: first ? first.branch : null,
    endCoulombs,
    endBranch: heldFirst ? held.branch : null,
    neverEnds,
    unreachableReason,
    pastReason,
  };
}

/** What makes a stop at zero seconds worth a word: the start lies beyond it by more than its tolerance. */
function explainPast({ stop, direction }: StepInput, loop: SeriesLoop): string | null {
  loop.at(0);
  const target = stop.relaxedVolts ?? null;
  const beyond = target === null ? 0 : loop.sense * (loop.emf - target) - stop.toleranceVolts;
  if (beyond > 1e-9)
    return `It already rests ${millivolts(beyond)} beyond the target's tolerance; a ${direction} moves it further away.`;
  const groupTarget = stop.groupRelaxedVolts ?? null;
  if (groupTarget === null) return null;
  const past = Math.max(...loop.counts.map((_, b) => loop.sense * (loop.branchVolts(b, 0) - groupTarget)));
  return past > 1e-9
    ? `A group already rests ${millivolts(past)} beyond its target; a ${direction} moves it further away.`
    : null;
}

function hasVoltageLimit(input: StepInput): boolean {
  return isGiven(input.source.setVolts) || isGiven(input.source.heldGroupVolts);
}

function explain(input: StepInput, loop: SeriesLoop, endCoulombs: number, held: boolean): string | null {
  const { stop, source, direction } = input;
  const side = direction === 'charge' ? 'below' : 'above';
  const hasTarget = isGiven(stop.relaxedVolts) || isGiven(stop.groupRelaxedVolts);
  if (!hasTarget) {
    if (!isGiven(stop.cutoffAmps)) return null;
    if (stop.cutoffAmps === 0) return 'An end current of 0 A is reached only in infinite time. Give one above 0 A.';
    return hasVoltageLimit(input)
      ? null
      : 'The current never falls to the end current, since no set voltage and no held group voltage limits it.';
  }
  if (endCoulombs === Infinity)
    return 'The curve is flat beyond its end, so the rest voltage never gets to the target.';
  loop.at(endCoulombs);
  const limit = held
    ? `a group held at ${volts(source.heldGroupVolts!)}`
    : `the set voltage of ${volts(source.setVolts!)}`;
  const target = !isGiven(stop.relaxedVolts)
    ? `no group gets to ${volts(stop.groupRelaxedVolts!)}`
    : `it stays ${side} the target of ${volts(stop.relaxedVolts)}`;
  const exact = Math.abs(loop.emf - (stop.relaxedVolts ?? Infinity)) <= stop.toleranceVolts + 1e-9;
  if (exact)
    return `With ${limit} the rest voltage comes to the target only in infinite time. Allow a tolerance or set the voltage higher.`;
  return `With ${limit} the rest voltage tends to ${volts(loop.emf)}, so ${target}.`;
}

function millivolts(value: number): string {
  return `${(1000 * value).toFixed(1)} mV`;
}

function volts(value: number): string {
  return `${value.toFixed(3)} V`;
}
