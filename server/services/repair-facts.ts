/** What stands of a repair: its rows without what a later reading or decision has overtaken. */
import type { FittedSpare } from '../entities/fitted-spare';
import type { PackReading } from '../entities/pack-reading';
import type { StoredTarget } from '../entities/repair-json';
import type { SecondSource } from '../entities/second-source';
import type { ChargeFile } from './charge-file';
import { isOpen } from './charge-stages';
import { packVerdict, type PackVerdict } from './pack-numbers';
import type { RepairFile } from './repair-file';

export type FactRows = Pick<RepairFile, 'repair' | 'readings' | 'sources' | 'charges' | 'fittedAsItIs'>;

export interface RepairFacts {
  /** The latest arrival reading; null: none, or it is to be read again. */
  arrival: PackReading | null;
  verdict: PackVerdict | null;
  /** The latest reading of any stage. */
  latest: PackReading | null;
  /** The latest second source at the present failing module. */
  source: SecondSource | null;
  /** The two point to different modules, and nobody has decided. */
  disagree: boolean;
  /** Module position that both sources, or somebody's decision, point to. */
  settled: string | null;
  /** Module position that is thought to fail: as settled, else as the pack's reading has it. */
  failing: string | null;
  target: StoredTarget | null;
  /** When the spare was reserved for the present failing module, epoch ms. */
  spareAt: number | null;
  /** The charge that is open for it. */
  open: ChargeFile | null;
  /** The charge that is ready or fitted. */
  ready: ChargeFile | null;
  fitted: ChargeFile | null;
  /** The spare that went in without a charge. */
  asItIs: FittedSpare | null;
  /** The latest reading since the fit. */
  proof: PackReading | null;
}

/** Readings that were not set aside. */
export const standing = (readings: readonly PackReading[]): PackReading[] =>
  readings.filter(({ setAsideAt }) => setAsideAt === null);

/**
 * Brings the rows down to what counts now. A new arrival reading that points to another module begins all that follows
 * the reading anew: what was done before it, for another module, is history. One that points to the same confirms it.
 */
export function repairFacts(file: FactRows): RepairFacts {
  const { repair, sources, charges } = file;
  const readings = standing(file.readings);
  const worstOf = (reading: PackReading): string | null => packVerdict(reading.groupVolts, repair).positions[0] ?? null;
  const arrivals = readings.filter(({ stage }) => stage === 'arrival');
  const newest = arrivals[0] ?? null;
  const readAgain = sources.find(({ decision }) => decision === 'read-again') ?? null;
  const arrival =
    newest !== null && readAgain !== null && newest.createdAt <= (readAgain.decidedAt ?? 0) ? null : newest;
  const worst = arrival === null ? null : worstOf(arrival);
  const anewAt = arrival === null ? -Infinity : beginOfRun(arrivals, worst, worstOf);

  const source =
    sources.find((one) => one.decision !== 'read-again' && one.createdAt >= anewAt && arrival !== null) ?? null;
  const settled = source === null ? null : (source.decidedPosition ?? (source.agrees ? source.modulePosition : null));
  const failing = settled ?? worst;
  const counts = (at: number, position: string | null): boolean =>
    at >= anewAt || (position !== null && position === failing);
  const counting = charges.filter(({ charge }) => counts(charge.createdAt, charge.modulePosition));
  const target = repair.target;
  const targetStands = target !== null && target.at >= anewAt && readings.some(({ id }) => id === target.readingId);
  const stageOf = (...stages: string[]): ChargeFile | null =>
    counting.find(({ charge }) => stages.includes(charge.stage)) ?? null;
  return {
    arrival,
    verdict: arrival === null ? null : packVerdict(arrival.groupVolts, repair),
    latest: readings[0] ?? null,
    source,
    disagree: source !== null && settled === null,
    settled,
    failing,
    target: targetStands ? target : null,
    spareAt: repair.spareAt !== null && repair.spareAt >= anewAt ? repair.spareAt : null,
    open: counting.find(({ charge }) => isOpen(charge.stage)) ?? null,
    ready: stageOf('ready', 'fitted'),
    fitted: stageOf('fitted'),
    asItIs: file.fittedAsItIs.find(({ at, modulePosition }) => counts(at, modulePosition)) ?? null,
    proof: readings.find((one) => one.stage !== 'arrival' && one.createdAt >= anewAt) ?? null,
  };
}

/** When the first of the latest arrival readings that all point to the same module was entered; −∞ where all of them do. */
function beginOfRun(
  arrivals: readonly PackReading[],
  worst: string | null,
  worstOf: (reading: PackReading) => string | null,
): number {
  const other = arrivals.findIndex((reading) => worstOf(reading) !== worst);
  return other < 0 ? -Infinity : Math.min(...arrivals.slice(0, other).map(({ createdAt }) => createdAt));
}
