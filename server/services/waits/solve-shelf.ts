/** The shelf voltage of a module type, in the thread of the waits. */
import { quantile, shelfVolts } from '@/calc/index';
import { jobControl } from './job-control';
import { replayModel } from './replay-model';
import type { ShelfSolved, ShelfTask } from './waits-tasks';

/** Fewer targets say nothing. */
const NEEDS = 20;
/** Volts of a group between two points of the curve. */
const STEP_VOLTS = 0.005;

/** @returns null: it was told to stop; `curve` empty: no channel brings a spare to every target from anywhere in the window */
export function solveShelf({ history, targets, stockVolts, window, control }: ShelfTask): ShelfSolved | null {
  const told = jobControl(control);
  if (told.isStopped()) return null;
  const has = targets.length;
  if (has < NEEDS) return { enough: false, needs: NEEDS, has };
  const model = replayModel(history);
  const kinds = history.kinds.flatMap(({ count }, kind) => (count > 0 ? [kind] : []));
  const minutesBetween = (from: number, to: number): number =>
    kinds.reduce((least, kind) => Math.min(least, model.between(0, kind, from, to) ?? Infinity), Infinity);
  const { curve, best, stockChargerHours } = shelfVolts({
    targetVolts: targets,
    minutesBetween,
    window,
    stockVolts,
    stepVolts: STEP_VOLTS,
  });
  /** Of the targets from the volts of the shelf. */
  const meanOf = (from: number): number => targets.reduce((sum, to) => sum + minutesBetween(from, to), 0) / has;
  const points = curve
    .map((one) => ({ volts: one.shelfVolts, meanMinutes: one.meanMinutes }))
    .filter(({ meanMinutes }) => Number.isFinite(meanMinutes));
  return {
    enough: true,
    charges: has,
    curve: points,
    best: { volts: best.shelfVolts, meanMinutes: best.meanMinutes },
    presentMinutes: finite(stockVolts.length === 0 ? Infinity : meanOf(quantile([...stockVolts], 0.5))),
    presentVolts: stockVolts.length === 0 ? null : quantile([...stockVolts], 0.5),
    stockChargerHours: finite(stockChargerHours),
  };
}

const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);
