/** The rest voltage with which packs of a kind usually arrive. */
import { inverseNormal, quantile } from '@/calc/index';
import type { PackType } from '../../entities/pack-type';
import type { Repair } from '../../entities/repair';
import type { ArrivedRepair } from '../../repositories/bench-ground.repository';

/** Fewer arrivals tell of those packs, not of the next one. */
const LEAST_ARRIVALS = 3;
/** Scatter of arrivals around a typed voltage, V. A guess: the workshop's own arrivals take its place. */
const TYPED_SCATTER_VOLTS = 0.02;
/** Arrivals that stand for all of them: each is planned for every spare. */
const STAND_FOR_ALL = 7;

export interface UsualArrival {
  volts: number;
  /** How many it is the median of; 0: somebody has typed it. */
  arrivals: number;
  /** Rest voltages that stand for how packs arrive, V. */
  likely: number[];
}

/**
 * What somebody has typed of the pack's type, else the median of at least three arrivals of that type of pack, else of
 * packs with the same modules.
 * @returns null where neither is known
 */
export function usualArrival(
  repair: Pick<Repair, 'packTypeId' | 'moduleTypeId'>,
  type: PackType | null,
  past: readonly ArrivedRepair[],
): UsualArrival | null {
  const voltsOf = (rows: readonly ArrivedRepair[]): number[] => rows.flatMap(({ target }) => target?.volts ?? []);
  const same = voltsOf(past.filter(({ packTypeId }) => packTypeId !== null && packTypeId === repair.packTypeId));
  const alike = voltsOf(past.filter(({ moduleTypeId }) => moduleTypeId === repair.moduleTypeId));
  const known = [same, alike].find(({ length }) => length >= LEAST_ARRIVALS) ?? null;
  const typed = type?.usualArrivalVolts ?? null;
  const shares = Array.from({ length: STAND_FOR_ALL }, (_, place) => (place + 0.5) / STAND_FOR_ALL);
  if (typed !== null) {
    const likely = known ?? shares.map((share) => typed + TYPED_SCATTER_VOLTS * inverseNormal(share));
    return { volts: typed, arrivals: 0, likely: standFor(likely, shares) };
  }
  if (known === null) return null;
  return { volts: toTenth(quantile(known, 0.5)), arrivals: known.length, likely: standFor(known, shares) };
}

const toTenth = (volts: number): number => Math.round(volts * 1e4) / 1e4;
const standFor = (volts: readonly number[], shares: readonly number[]): number[] =>
  volts.length <= shares.length ? [...volts].map(toTenth) : shares.map((share) => toTenth(quantile([...volts], share)));
