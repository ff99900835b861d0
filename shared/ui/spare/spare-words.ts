/** What screens say of a spare. Pure. */
import type { SpareDto } from '@/shared/contract/spare';
import { ampHours, volts } from '../format/quantities';
import { pointMarks } from '../format/marks';

export const sourceWords: Readonly<Record<SpareDto['capacitySource'], string>> = {
  measured: 'measured',
  label: 'off the label',
  guessed: 'guessed',
};

/** In words as in the contract's names; apart from it, whose schemas a list does without. */
export const conditionWords: Readonly<Record<SpareDto['condition'], string>> = {
  sound: 'Sound',
  swollen: 'Swollen',
  leaking: 'Leaking',
  dented: 'Dented',
  water: 'Water got in',
  'deep-discharged': 'Deep-discharged',
};

/** Nobody typed a capacity, nor a health: what plans use is a guess whatever source was chosen. */
export const isCapacityGuessed = (spare: Pick<SpareDto, 'capacityAh' | 'healthPercent' | 'capacitySource'>): boolean =>
  spare.capacitySource === 'guessed' || (spare.capacityAh === null && spare.healthPercent === null);

/** '60.4 Ah measured' */
export const capacityWords = (spare: SpareDto, marks = pointMarks): string =>
  `${ampHours(spare.usedCapacityAh, marks)} ${isCapacityGuessed(spare) ? 'guessed' : sourceWords[spare.capacitySource]}`;

/** Half of the 10–90 % band of a normal spread, in standard deviations (tables of the normal distribution: 1.2816). */
const BAND_SD = 1.2816;
/** The band of the capacity plans use, Ah of a group. */
export const capacityBandOf = (spare: Pick<SpareDto, 'usedCapacityAh' | 'capacitySdAh'>) => ({
  low: spare.usedCapacityAh - BAND_SD * spare.capacitySdAh,
  likely: spare.usedCapacityAh,
  high: spare.usedCapacityAh + BAND_SD * spare.capacitySdAh,
});

/** The same of one figure that was typed or found. */
export const figureBandOf = ({ ampHours, sdAh }: { ampHours: number; sdAh: number }) =>
  capacityBandOf({ usedCapacityAh: ampHours, capacitySdAh: sdAh });

/** Highest minus lowest group, V. */
export const apartVolts = (groups: readonly number[]): number =>
  groups.length === 0 ? 0 : Math.max(...groups) - Math.min(...groups);

/** A reading older than this widens the band of a plan so much that it is worth a new one, days. */
export const OLD_READING_DAYS = 30;

/** Why no plan takes it, in a few words; null: it can be planned. */
export function ruledOutWords(spare: SpareDto, marks = pointMarks): string | null {
  if (spare.quarantine) return spare.quarantine.reason;
  if (spare.condition !== 'sound') return `${conditionWords[spare.condition]}, not to be charged`;
  const lowest = spare.reading ? Math.min(...spare.reading.groupVolts) : null;
  if (lowest !== null && lowest < spare.floorVolts)
    return `${volts(lowest, marks)}, under the floor of ${volts(spare.floorVolts, marks)}`;
  return null;
}

/**
 * 'Read before R-2418': its groups have been moved since, and no plan takes it before it is read again. Null where the
 * reading stands, and while its own charge is under way, whose figures are shown instead.
 */
export function readBeforeWords(spare: Pick<SpareDto, 'reading' | 'where' | 'charge'>): string | null {
  const movedBy = spare.reading?.movedBy;
  if (!movedBy) return null;
  const waits = spare.charge?.stage === 'planned' || spare.charge?.stage === 'queued';
  return spare.where === 'charge' && !waits ? null : `Read before ${movedBy.title}`;
}

/** Searched as the server searches: label, type, shelf place. */
export function matches(spare: Pick<SpareDto, 'label' | 'typeName' | 'shelfPlace'>, typed: string): boolean {
  const looked = typed.trim().toLowerCase();
  return [spare.label, spare.typeName, spare.shelfPlace ?? ''].some((text) => text.toLowerCase().includes(looked));
}

/** By type, then by label: as the shelf is walked. */
export const shelfOrder = (spares: readonly SpareDto[]): SpareDto[] =>
  [...spares].sort((a, b) => a.typeName.localeCompare(b.typeName) || a.label.localeCompare(b.label));
