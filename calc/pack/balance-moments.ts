import type { OcvTable } from '../types';
import { balanceCounts, type PackReading } from './pack-reading';
import { spreadFigure, type SpreadFigure } from './spread-figure';

/** The spread after a number of balance charges. */
export interface BalanceMoment extends SpreadFigure {
  count: number;
}

/**
 * The part of a log that balancing has to answer for: from the fit on, since what was lost before is the exchange; all of it
 * where nothing was fitted. Of two readings at the same count the later one stands.
 *
 * @throws CalcInputError for readings that cannot be, of different packs, or in the wrong order
 */
export function balanceMoments(
  log: readonly PackReading[],
  curve: OcvTable,
  capacityAh: number | number[],
  noiseVolts: number,
): BalanceMoment[] {
  const counts = balanceCounts(log);
  const fitted = log.some(({ stage }) => stage !== 'arrival');
  const moments = new Map<number, BalanceMoment>();
  log.forEach(({ volts, stage }, at) => {
    const count = counts[at]!;
    if (!fitted || stage !== 'arrival')
      moments.set(count, { count, ...spreadFigure(volts, curve, capacityAh, noiseVolts) });
  });
  return [...moments.values()];
}
