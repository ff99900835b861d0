import { voltsAtSoc } from '../curve/ocv';
import type { TracePlanPoint } from '../plan-types';
import type { TracePoint } from '../types';
import type { Clock } from './clock';
import type { DraftStep } from './draft';
import type { PlanModel } from './plan-model';

const CURRENT_POINTS = 60;
const REST_POINTS = 10;

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
  const currentS = steps.reduce((sum, step) => sum + step.seconds, 0);
  let soc = model.startSoc;
  const order = steps.map((_, at) => at).sort((a, b) => clock.startS[a]! - clock.startS[b]! || a - b);
  for (const at of order) {
    const step = steps[at]!;
    const count = Math.max(4, Math.round((CURRENT_POINTS * step.seconds) / Math.max(currentS, 1)));
    for (const point of thinned(step.trace, Math.min(count, CURRENT_POINTS / Math.max(1, steps.length / 20)))) {
      const now = [...soc];
      step.groupIndexes.forEach((group, place) => (now[group] = point.soc[Math.min(place, point.soc.length - 1)]!));
      points.push({
        s: clock.startS[at]! + point.s,
        amps: point.amps,
        clipVolts: point.terminalVolts / step.groupsAcross,
        restVolts: meanVolts(model, now),
      });
    }
    soc = steps[at]!.socAfter;
  }
  if (points.length === 0) return [];
  points.sort((a, b) => a.s - b.s);
  const kept = thinned(points, 120 - REST_POINTS - 1);
  addBand(kept, clock, spread);
  addRest(model, steps, clock, kept);
  return kept.map(rounded);
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
