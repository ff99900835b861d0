import { CalcInputError } from '../errors';
import { requireGroupVolts } from './group-volts';

export type PackStage = 'arrival' | 'after-fit' | 'after-balance';

/** One reading of the whole pack at rest. */
export interface PackReading {
  /** Of each group, V. */
  volts: number[];
  stage: PackStage;
  /** After which balance charge, 1 or more; left out: the next one. Only with 'after-balance'. */
  balanceCount?: number;
}

/** A number with the 10th and 90th percentile about it. */
export interface Likely {
  low: number;
  likely: number;
  high: number;
}

const ORDER: Record<PackStage, number> = { arrival: 0, 'after-fit': 1, 'after-balance': 2 };

/**
 * Balance charges behind each reading, in their order. Two readings at the same count are one moment, read twice.
 *
 * @throws CalcInputError for volts that cannot be, readings of different packs, stages or counts that go backwards
 */
export function balanceCounts(log: readonly PackReading[]): number[] {
  const counts: number[] = [];
  log.forEach((reading, at) => {
    const before = log[at - 1];
    requireGroupVolts(`log[${at}].volts`, reading.volts);
    if (!Object.hasOwn(ORDER, reading.stage))
      throw new CalcInputError(`log[${at}].stage`, reading.stage, "'arrival', 'after-fit' or 'after-balance'");
    if (before && reading.volts.length !== before.volts.length)
      throw new CalcInputError(`log[${at}].volts`, reading.volts, `a list of ${before.volts.length}, as before`);
    if (before && ORDER[reading.stage] < ORDER[before.stage])
      throw new CalcInputError(`log[${at}].stage`, reading.stage, `not earlier than ${before.stage}, read before it`);
    const last = counts[at - 1] ?? 0;
    const count = reading.stage === 'after-balance' ? (reading.balanceCount ?? last + 1) : 0;
    if (!Number.isInteger(count) || count < Math.max(last, reading.stage === 'after-balance' ? 1 : 0))
      throw new CalcInputError(`log[${at}].balanceCount`, count, `a whole number, ${Math.max(last, 1)} or more`);
    counts.push(count);
  });
  return counts;
}
