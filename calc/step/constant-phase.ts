import { firstReach, type SplitFunction } from './first-reach';
import { AMPS, HELD, LOAD, SET, WATTS } from './laws';
import type { Ending, Run } from './run';

/** How far a law must have let go before current flows again, V. */
const RELEASE_VOLTS = 1e-9;
const TRACE_POINTS = 48;

/**
 * A stretch of constant current (zero while a voltage limit lies below the groups), in closed form: the charge rises
 * in a straight line, each over-voltage goes exponentially to I·R1, and every event is a level of a voltage.
 */
export function constantPhase(run: Run, law: number, amps: number): Ending {
  const { loop, stops } = run;
  let endS = stops.maxSeconds - run.s;
  let ending: Ending = { kind: 'time-cap' };
  const offer = (s: number | null, what: Ending) => {
    if (s !== null && s < endS) {
      endS = s;
      ending = what;
    }
  };
  if (amps > 0) offer((stops.atCoulombs - run.y[0]!) / amps, { kind: 'target' });
  const limitS = endS;
  const horizonS = Number.isFinite(endS) ? endS : horizon(run, amps);
  endS = horizonS;
  if (!Number.isFinite(limitS)) ending = { kind: 'dead' };

  const level = run.groupLevel;
  if (level !== null)
    for (let b = 0; b < loop.branchCount; b++)
      offer(firstReach(branchFunction(run, b, amps), level, endS), { kind: 'group-limit', branch: b });
  if (amps > 0) offerLaws(run, law, amps, offer, () => endS);
  else
    offer(firstReach(negated(lawFunction(run, law, 0)), -lawLevel(run, law) + RELEASE_VOLTS, endS), {
      kind: 'switch',
      law: null,
    });

  advance(run, amps, endS);
  return ending;
}

/** Long enough for anything that can still happen: every over-voltage settled and every group far outside its curve. */
function horizon(run: Run, amps: number): number {
  const settledS = 60 * Math.max(...run.loop.classTau);
  if (amps === 0) return settledS;
  const slowest = Math.min(...run.loop.socPerCoulomb.map(Math.abs));
  return settledS + 100 / (slowest * amps);
}

function offerLaws(
  run: Run,
  ruling: number,
  amps: number,
  offer: (s: number | null, what: Ending) => void,
  endS: () => number,
): void {
  const { loop, laws } = run;
  for (const kind of laws.kinds) {
    if (kind === ruling || kind === AMPS) continue;
    const f = lawFunction(run, kind, amps);
    if (kind === WATTS) {
      const level = laws.limits.maxWatts! / amps;
      // Charging, the power rises with the voltage; discharging, it falls with it.
      const reach = loop.sense > 0 ? firstReach(f, level, endS()) : firstReach(negated(f), level, endS());
      offer(reach, { kind: 'switch', law: kind });
    } else
      offer(firstReach(f, lawLevel(run, kind) - (kind === LOAD ? amps * laws.limits.loadOhm! : 0), endS()), {
        kind: 'switch',
        law: kind,
      });
  }
}

function lawLevel(run: Run, kind: number): number {
  const { loop, laws } = run;
  if (kind === SET) return loop.sense * laws.limits.setVolts!;
  if (kind >= HELD) return loop.sense * laws.limits.heldVolts!;
  return 0;
}

/** The voltage a law watches: the supply's, or one group's, counted in the current's direction. */
function lawFunction(run: Run, kind: number, amps: number): SplitFunction {
  return kind >= HELD ? branchFunction(run, kind - HELD, amps) : supplyFunction(run, amps);
}

function supplyFunction(run: Run, amps: number): SplitFunction {
  const { loop, laws } = run;
  const from = run.y[0]!;
  let constant = amps * laws.limits.totalOhm;
  const growing: [number, number][] = [];
  const shrinking: [number, number][] = [];
  for (let c = 0; c < run.classes; c++) {
    const end = amps * loop.classOhm[c]!;
    constant += end;
    const part = run.y[1 + c]! - end;
    if (part !== 0) (part < 0 ? growing : shrinking).push([part, loop.classTau[c]!]);
  }
  return {
    rising: (s) => {
      loop.at(from + amps * s);
      return loop.sense * loop.emf + constant + decayed(growing, s);
    },
    falling: shrinking.length > 0 ? (s) => decayed(shrinking, s) : null,
  };
}

function branchFunction(run: Run, b: number, amps: number): SplitFunction {
  const { loop, laws } = run;
  const from = run.y[0]!;
  const end = amps * loop.classOhm[loop.classOf[b]!]! * loop.share[b]!;
  const part: [number, number][] = [[laws.over(b, run.y) - end, loop.classTau[loop.classOf[b]!]!]];
  const constant = amps * loop.ohmic[b]! + end;
  const grows = part[0]![0] <= 0;
  return {
    rising: (s) => loop.sense * loop.branchVolts(b, from + amps * s) + constant + (grows ? decayed(part, s) : 0),
    falling: grows ? null : (s) => decayed(part, s),
  };
}

function decayed(parts: [number, number][], s: number): number {
  let sum = 0;
  for (const [part, tau] of parts) sum += part * Math.exp(-s / tau);
  return sum;
}

function negated(f: SplitFunction): SplitFunction {
  const { rising, falling } = f;
  return { rising: falling ? (s) => -falling(s) : () => 0, falling: (s) => -rising(s) };
}

/** Brings the state `s` seconds on, with the energy. */
function advance(run: Run, amps: number, s: number): void {
  if (run.trace) {
    const start = run.y.slice();
    for (let k = 0; k < TRACE_POINTS; k++) {
      const at = (s * k) / TRACE_POINTS;
      run.record(run.s + at, stateAfter(run, start, amps, at), amps);
    }
  }
  for (let c = 0; c < run.classes; c++) {
    const end = amps * run.loop.classOhm[c]!;
    const tau = run.loop.classTau[c]!;
    run.lossWs += amps * (end * s - (run.y[1 + c]! - end) * tau * Math.expm1(-s / tau));
  }
  run.lossWs += amps * amps * run.moduleOhm * s;
  run.y = stateAfter(run, run.y, amps, s);
  run.s += s;
  run.peakAmps = Math.max(run.peakAmps, amps);
  run.record(run.s, run.y, amps);
}

function stateAfter(run: Run, y: number[], amps: number, s: number): number[] {
  const next = y.slice();
  next[0] = y[0]! + amps * s;
  for (let c = 0; c < run.classes; c++) {
    const end = amps * run.loop.classOhm[c]!;
    const decay = Math.exp(-s / run.loop.classTau[c]!);
    next[1 + c] = end + (y[1 + c]! - end) * decay;
    if (run.laws.decays) next[1 + run.classes + c] = y[1 + run.classes + c]! * decay;
  }
  return next;
}
