import { CalcInputError } from './errors';
import { requireFinite, requireNotNegative, requirePositive } from './require';
import { Laws } from './step/laws';
import { coulombsToEmf } from './step/reach';
import { Run } from './step/run';
import { runLoop } from './step/run-loop';
import type { LoopPart, Sense } from './step/branches';
import { SeriesLoop } from './step/series-loop';
import { validateEfficiency, validateGroups } from './step/validate-step';
import type { EqualiseInput, EqualiseResult, EqualiseSide } from './types';

/**
 * Two modules joined through a resistor until their rest voltages differ by no more than asked, or until the first one
 * rests where it is wanted. The higher one discharges into the lower one; I = (E_high − E_low)/(ΣR + R), exponential
 * where both curves are straight.
 *
 * Where the stop lies beyond the point at which both are level, or is reached only in infinite time, the outcome is
 * 'unreachable' with the reason, zero seconds, and the rest voltages both would tend to.
 *
 * @throws CalcInputError for input that cannot be, and where no stop is given
 */
export function equaliseThroughResistor(input: EqualiseInput): EqualiseResult {
  validate(input);
  const { first, second, resistorOhm, stopDifferenceVolts } = input;
  const stopFirst = input.stopFirstRelaxedVolts ?? null;
  const gap = sumOf(first) - sumOf(second);
  const firstIsHigher = gap >= 0;
  const high = partOf(firstIsHigher ? first : second, -1, 1);
  const low = partOf(firstIsHigher ? second : first, 1, -1);
  const loop = new SeriesLoop([high, low]);
  const alone = new SeriesLoop([{ ...(firstIsHigher ? high : low), side: 1 }]);
  const ohm = loop.totalOhmic + (first.linkResistanceOhm ?? 0) + (second.linkResistanceOhm ?? 0);
  const laws = new Laws(
    loop,
    { maxAmps: null, maxWatts: null, setVolts: null, heldVolts: null, loadOhm: resistorOhm, totalOhm: ohm },
    false,
  );

  const level = gap === 0 ? 0 : coulombsToEmf(loop, 0);
  const byDifference = stopDifferenceVolts === null ? Infinity : coulombsToEmf(loop, stopDifferenceVolts);
  const wrongWay = stopFirst !== null && alone.sense * (stopFirst - sumOf(first)) < -1e-9;
  const byFirst = stopFirst === null || wrongWay ? Infinity : coulombsToEmf(alone, stopFirst);
  const atCoulombs = Math.min(byDifference, byFirst);
  const peakAtStart = Math.abs(laws.amps(laws.kinds[0]!, [0, ...loop.classStart]));
  const relaxed = (q: number) => relaxedAt(loop, alone, q, firstIsHigher);

  if (atCoulombs > 0 && atCoulombs >= level * (1 - 1e-12))
    return {
      outcome: 'unreachable',
      reason: explain(input, relaxed(level).firstRelaxedVolts),
      stopAtS: 0,
      ampHours: 0,
      ...relaxed(level),
      peakAmps: peakAtStart,
    };
  const run = new Run(
    loop,
    laws,
    { atCoulombs, cutoffAmps: 0, groupVolts: null, maxSeconds: Infinity },
    ohm,
    true,
    false,
  );
  run.peakAmps = peakAtStart;
  runLoop(run);
  const q = run.y[0]!;
  return { outcome: 'target', stopAtS: run.s, ampHours: q / 3600, ...relaxed(q), peakAmps: run.peakAmps };
}

function validate(input: EqualiseInput): void {
  for (const side of ['first', 'second'] as const) {
    validateGroups(`${side}.groups`, input[side].groups);
    requireNotNegative(`${side}.linkResistanceOhm`, input[side].linkResistanceOhm ?? 0);
    validateEfficiency(`${side}.coulombicEfficiency`, input[side].coulombicEfficiency ?? 1);
  }
  requirePositive('resistorOhm', input.resistorOhm);
  if (input.stopDifferenceVolts !== null) requireNotNegative('stopDifferenceVolts', input.stopDifferenceVolts);
  const stopFirst = input.stopFirstRelaxedVolts ?? null;
  if (stopFirst !== null) requireFinite('stopFirstRelaxedVolts', stopFirst);
  if (input.stopDifferenceVolts === null && stopFirst === null)
    throw new CalcInputError('stopDifferenceVolts', null, 'given, or stopFirstRelaxedVolts instead');
}

function partOf(side: EqualiseSide, sense: Sense, onSide: Sense): LoopPart {
  const efficiency = sense > 0 ? (side.coulombicEfficiency ?? 1) : 1;
  return { groups: side.groups, curve: side.curve, sense, side: onSide, efficiency };
}

function sumOf(side: EqualiseSide): number {
  return side.groups.reduce((sum, group) => sum + group.restVolts, 0);
}

function relaxedAt(loop: SeriesLoop, alone: SeriesLoop, q: number, firstIsHigher: boolean) {
  loop.at(q);
  alone.at(q);
  const firstRelaxedVolts = alone.emf;
  return { firstRelaxedVolts, secondRelaxedVolts: firstRelaxedVolts - (firstIsHigher ? loop.emf : -loop.emf) };
}

function explain(input: EqualiseInput, levelVolts: number): string {
  const stopFirst = input.stopFirstRelaxedVolts ?? null;
  if (stopFirst === null)
    return 'Their rest voltages become equal only in infinite time. Allow a difference above 0 V.';
  return `Both settle at ${levelVolts.toFixed(3)} V, so the first does not get to ${stopFirst.toFixed(3)} V this way.`;
}
