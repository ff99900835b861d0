import { voltsAtSoc } from '../curve/ocv';
import type { TracePlanPoint } from '../plan-types';
import type { TracePoint } from '../types';
import { roundsOf, type Clock } from './clock';
import type { DraftStep } from './draft';
import type { PlanModel } from './plan-model';

const CURRENT_POINTS = 60;
const REST_POINTS = 10;
const LEAST_POINTS = 4;

/**
 * The picture of the likely run: amps, volts under current and rest volts from the clip-on to the end of the rest, at most
 * 120 points.
 *
 * @param spread shortest and longest current over the nominal one (10 and 90 %), for the tint of the band
 */
export function toTrace(
  model: PlanModel,
  steps: DraftStep[],
  clock: Clock,
  spread: { shortest: number; longest: number },
): TracePlanPoint[] {
  const points: TracePlanPoint[] = [];
  const currentS = clock.currentEndS - clock.currentStartS;
  let soc: readonly number[] = model.startSoc;
  for (const round of roundsOf(steps)) {
    const own = round.map((at) => steps[at]!).filter((step) => step.trace.length > 0);
    if (own.length === 0) continue;
    const longest = own.reduce((most, step) => (step.seconds > most.seconds ? step : most));
    const share = Math.max(LEAST_POINTS, Math.round((CURRENT_POINTS * longest.seconds) / Math.max(currentS, 1)));
    const before = soc;
    for (const { s } of thinned(longest.trace, Math.min(share, CURRENT_POINTS / Math.ceil(steps.length / 12))))
      points.push(pointAt(model, own, before, s, clock.startS[round[0]!]! + s));
    soc = steps[round[round.length - 1]!]!.socAfter;
  }
  if (points.length === 0) return [];
  const kept = thinned(points, 120 - REST_POINTS - 2);
  addBand(kept, clock, spread);
  addRest(model, steps, clock, kept);
  return kept.map(rounded);
}

/** One moment of a round: steps side by side add their amps, and their clip volts are the mean of theirs. */
function pointAt(
  model: PlanModel,
  round: DraftStep[],
  before: readonly number[],
  s: number,
  atS: number,
): TracePlanPoint {
  const soc = [...before];
  let amps = 0;
  let clipVolts = 0;
  for (const step of round) {
    const point = interpolated(step.trace, s);
    step.groupIndexes.forEach((group, at) => (soc[group] = point.soc[Math.min(at, point.soc.length - 1)]!));
    amps += point.amps;
    clipVolts += point.terminalVolts / step.groupsAcross / round.length;
  }
  return { s: atS, amps, clipVolts, restVolts: meanVolts(model, soc) };
}

/** A step's course at one moment, straight between its points; after its end without current. */
function interpolated(trace: TracePoint[], s: number): TracePoint {
  const last = trace[trace.length - 1]!;
  if (s > last.s + 1e-6) return { ...last, s, amps: 0 };
  const next = trace.findIndex((point) => point.s >= s);
  if (next <= 0) return next < 0 ? last : trace[0]!;
  const a = trace[next - 1]!;
  const b = trace[next]!;
  const part = b.s === a.s ? 1 : (s - a.s) / (b.s - a.s);
  const between = (from: number, to: number): number => from + (to - from) * part;
  return {
    s,
    amps: between(a.amps, b.amps),
    terminalVolts: between(a.terminalVolts, b.terminalVolts),
    soc: a.soc.map((from, at) => between(from, b.soc[at]!)),
  };
}

function meanVolts(model: PlanModel, soc: readonly number[]): number {
  return soc.reduce((sum, at) => sum + voltsAtSoc(model.curve, at), 0) / soc.length;
}

/** Where the rest voltage would be had the current gone faster or slower: the likely course, stretched in time. */
function addBand(points: TracePlanPoint[], clock: Clock, spread: { shortest: number; longest: number }): void {
  const at = (s: number): number => {
    const next = points.findIndex((point) => point.s >= s);
    if (next < 0) return points[points.length - 1]!.restVolts;
    if (next === 0) return points[0]!.restVolts;
    const a = points[next - 1]!;
    const b = points[next]!;
    return b.s === a.s ? b.restVolts : a.restVolts + ((b.restVolts - a.restVolts) * (s - a.s)) / (b.s - a.s);
  };
  const from = clock.currentStartS;
  const warped = points.map((point) =>
    [spread.shortest, spread.longest].map((ratio) => at(from + (point.s - from) / Math.max(ratio, 1e-3))),
  );
  warped.forEach((pair, index) => {
    points[index]!.restLowVolts = Math.min(...pair);
    points[index]!.restHighVolts = Math.max(...pair);
  });
}

function addRest(model: PlanModel, steps: DraftStep[], clock: Clock, points: TracePlanPoint[]): void {
  const last = steps.reduce((latest, step, at) => (clock.stopS[at]! >= clock.stopS[latest]! ? at : latest), 0);
  const step = steps[last]!;
  const over = step.polarisationAfter.reduce((sum, volts) => sum + volts, 0) / step.polarisationAfter.length;
  const tauS = model.groups[0]!.polarisationTimeConstantS;
  const restVolts = meanVolts(model, lastSoc(steps, model));
  const base =
    step.groupIndexes.length === model.groups.length
      ? restVolts
      : voltsAtSoc(model.curve, step.socAfter[step.groupIndexes[0]!]!);
  for (let at = 0; at <= REST_POINTS; at += 1) {
    const part = (at / REST_POINTS) ** 2;
    const s = clock.currentEndS + (clock.restEndS - clock.currentEndS) * part;
    const left = Math.exp(-(s - clock.currentEndS) / tauS);
    points.push({
      s,
      amps: 0,
      clipVolts: base + over * left,
      restVolts,
      restLowVolts: restVolts,
      restHighVolts: restVolts,
    });
  }
}

const lastSoc = (steps: DraftStep[], model: PlanModel): readonly number[] =>
  steps.length === 0 ? model.startSoc : steps[steps.length - 1]!.socAfter;

/** A tenth of a second, a milliampere, a tenth of a millivolt: finer cannot be drawn, and a plan carries forty of these. */
function rounded(point: TracePlanPoint): TracePlanPoint {
  const volts = (value: number): number => Math.round(value * 1e4) / 1e4;
  return {
    s: Math.round(point.s * 10) / 10,
    amps: Math.round(point.amps * 1e3) / 1e3,
    clipVolts: volts(point.clipVolts),
    restVolts: volts(point.restVolts),
    restLowVolts: volts(point.restLowVolts ?? point.restVolts),
    restHighVolts: volts(point.restHighVolts ?? point.restVolts),
  };
}

/** At most `most` of the points, straight between those that are given, evenly over their time; ends kept. */
function thinned<P extends TracePoint | TracePlanPoint>(points: P[], most: number): P[] {
  const wanted = Math.max(2, Math.floor(most));
  if (points.length <= wanted) return points;
  const first = points[0]!.s;
  const lastS = points[points.length - 1]!.s;
  const kept: P[] = [];
  let from = 0;
  for (let at = 0; at < wanted; at += 1) {
    const s = first + ((lastS - first) * at) / (wanted - 1);
    while (from < points.length - 1 && points[from]!.s < s) from += 1;
    if (kept[kept.length - 1] !== points[from]) kept.push(points[from]!);
  }
  if (kept[kept.length - 1] !== points[points.length - 1]) kept.push(points[points.length - 1]!);
  return kept;
}
