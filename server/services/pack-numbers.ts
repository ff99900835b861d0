/** From the rows of a repair to the numbers of its pack. */
import { CalcInputError, chemistryParameters, oddGroups, packTarget, readingAmpHours } from '@/calc/index';
import { DEFAULT_SPREADS } from '@/calc/plan/default-spreads';
import type { OcvTable } from '@/calc/types';
import { groupsAt, positionsOf, type PackInput } from '@/shared/contract/pack';
import type { ComputedTargetDto } from '@/shared/contract/pack-reading';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { PackReading } from '../entities/pack-reading';
import { meterOffsetSdVolts } from './meter-trust';
import { moduleParameters } from './plan-parameters';
import { UNKNOWN_HEALTH } from './spare-capacity';

type Layout = Pick<PackInput, 'groupCount' | 'groupsPerModule' | 'positionOfGroup'>;

/** What a reading says of its pack. */
export interface PackVerdict {
  medianVolts: number;
  lowestVolts: number;
  highestVolts: number;
  spreadMillivolts: number;
  /** 0-based. */
  odd: number[];
  /** Module positions that the odd groups point to, the worst first. */
  positions: string[];
}

/** Volts as millivolts to the microvolt: 3.968 − 3.958 is 10 mV and not a hair more. */
export const inMillivolts = (volts: number): number => Math.round(volts * 1e6) / 1e3;

/** Spread, median and odd groups of a reading, and the modules that they point to. */
export function packVerdict(volts: readonly number[], layout: Layout): PackVerdict {
  const found = oddGroups(volts);
  const positions = positionsOf(layout);
  const worst = new Map<string, number>();
  for (const group of found.odd) {
    const position = positions[group] ?? '';
    worst.set(position, Math.max(worst.get(position) ?? 0, Math.abs(found.scores[group] ?? 0)));
  }
  return {
    medianVolts: found.medianVolts,
    lowestVolts: found.lowest.volts,
    highestVolts: found.highest.volts,
    spreadMillivolts: inMillivolts(found.spreadVolts),
    odd: found.odd,
    positions: [...worst].sort(([, one], [, other]) => other - one).map(([position]) => position),
  };
}

/** The curve that plans of a type go by. */
export const curveOf = (type: ModuleType): OcvTable =>
  moduleParameters(type).curve ?? chemistryParameters(type.chemistry).curve;

/** Ah of a group of a pack in use; nobody has measured it: the rated one times the usual health. */
export const packCapacityAh = (type: Pick<ModuleType, 'ratedAh'>): number => type.ratedAh * UNKNOWN_HEALTH;

/** Of each group against the median one, Ah, and their spread; null: no type, or volts beyond what can be. */
export function ampHoursOf(
  volts: number[],
  type: ModuleType | null,
): { groupAmpHours: number[]; spreadAmpHours: number } | null {
  if (type === null) return null;
  const found = orNull(() => readingAmpHours({ volts, curve: curveOf(type), capacityAh: packCapacityAh(type) }));
  return found === null ? null : { groupAmpHours: found.ampHours, spreadAmpHours: found.spreadAh };
}

/**
 * Stands in for a curve where no module type is known: so steep that nothing is said of flatness, which only a type's own
 * curve can tell.
 */
const UNKNOWN_CURVE: OcvTable = { soc: [0, 1], volts: [1, 4.5] };

/**
 * The target by the healthy groups of a reading, in the volts of the instrument that read it: a plan takes the meter's
 * known offset off. Without a module type no slope is known, and the trust is never good.
 * @param failing module position that goes out; none of its groups counts
 * @returns null where no healthy group is left
 */
export function computedTarget(
  reading: PackReading,
  layout: Layout,
  failing: string | null,
  type: ModuleType | null,
  meter: Meter | null,
  now: number,
): ComputedTargetDto | null {
  const { odd } = packVerdict(reading.groupVolts, layout);
  const out = new Set([...odd, ...(failing === null ? [] : groupsAt(layout, failing))]);
  const chemistry = type === null ? null : chemistryParameters(type.chemistry);
  const found = orNull(() =>
    packTarget({
      volts: reading.groupVolts,
      odd: [...out],
      curve: type === null ? UNKNOWN_CURVE : curveOf(type),
      meterSdVolts: (meter === null ? undefined : meterOffsetSdVolts([meter], now)) ?? DEFAULT_SPREADS.meterVolts,
      ageS: Math.max(0, (now - reading.at) / 1000),
      celsius: reading.celsius,
      temperatureCoefficient: chemistry?.temperatureCoefficient ?? null,
      restS: reading.restedMinutes === null ? null : reading.restedMinutes * 60,
      hysteresisVolts: chemistry?.hysteresisVolts ?? 0,
      capacityAh: type === null ? null : packCapacityAh(type),
    }),
  );
  if (found === null) return null;
  return {
    readingId: reading.id,
    // To the tenth of a millivolt: more is not read.
    volts: Math.round(found.volts * 1e4) / 1e4,
    standardErrorMillivolts: found.standardErrorVolts * 1000,
    // V per whole charge × 1000 mV ÷ 100 %.
    slopeMillivoltsPerPercent: type === null ? null : found.slopeVoltsPerSoc * 10,
    healthy: found.healthy,
    trust: type === null && found.trust === 'good' ? 'fair' : found.trust,
    reasons: found.reasons,
  };
}

/** Null where the numbers cannot be. */
export function orNull<T>(reckon: () => T): T | null {
  try {
    return reckon();
  } catch (error) {
    if (error instanceof CalcInputError) return null;
    throw error;
  }
}
