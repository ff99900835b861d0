/** A spare in one line, where a plan chooses it. */
import type { SpareDto } from '@/shared/contract/spare';
import type { LocaleMarks } from '../format/marks';
import { volts } from '../format/quantities';
import { readBeforeWords } from '../spare/spare-words';

/** What it rests at and where it is: ['3.571 V', 'D4'], ['to be read again', 'on a charge']. */
export function spareFacts(spare: SpareDto, marks: LocaleMarks): string[] {
  const lowest =
    readBeforeWords(spare) !== null
      ? 'to be read again'
      : spare.reading
        ? volts(Math.min(...spare.reading.groupVolts), marks)
        : '';
  const where =
    spare.where === 'shelf' ? (spare.shelfPlace ?? '') : spare.where === 'charge' ? 'on a charge' : spare.where;
  return [lowest, where].filter(Boolean);
}

/** 'S-0408 · 2-series 66 Ah, 3.571 V, D4' */
export const spareLine = (spare: SpareDto, marks: LocaleMarks): string =>
  [`${spare.label} · ${spare.typeName}`, ...spareFacts(spare, marks)].join(', ');
