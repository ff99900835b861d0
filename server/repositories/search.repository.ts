import { Brackets, type EntityManager, type SelectQueryBuilder } from 'typeorm';
import { Charge } from '../entities/charge';
import { Repair } from '../entities/repair';

/** One word that was looked for, in lower case, with the ids of what it names by another table's text. */
export interface LookedWord {
  word: string;
  moduleTypeIds: readonly string[];
  spareIds: readonly string[];
}

/** Every id that stands in a condition; an empty list would be no SQL. */
const none = ['none'];
const idsOr = (ids: readonly string[]): string[] => (ids.length === 0 ? none : [...ids]);

/** The marks that LIKE understands become the one for any letter: nothing is missed by it. */
const like = (word: string): string => `%${word.replace(/[%_\\]/g, '_')}%`;

function everyWord<Row extends object>(
  builder: SelectQueryBuilder<Row>,
  words: readonly LookedWord[],
  condition: (at: number) => string,
): SelectQueryBuilder<Row> {
  words.forEach(({ word, moduleTypeIds, spareIds }, at) => {
    builder.andWhere(new Brackets((all) => all.where(condition(at))), {
      [`word${at}`]: like(word),
      [`types${at}`]: idsOr(moduleTypeIds),
      [`spares${at}`]: idsOr(spareIds),
    });
  });
  return builder;
}

/** Repairs in which every word stands, the last booked first. */
export function searchRepairs(
  manager: EntityManager,
  workshopId: string,
  words: readonly LookedWord[],
  deletedToo: boolean,
  most: number,
): Promise<Repair[]> {
  const builder = manager.createQueryBuilder(Repair, 'repair').where('repair.workshopId = :workshopId', { workshopId });
  if (!deletedToo) builder.andWhere('repair.deletedAt IS NULL');
  return everyWord(
    builder,
    words,
    (at) =>
      `repair.searchText LIKE :word${at} OR repair.moduleTypeId IN (:...types${at}) OR repair.spareId IN (:...spares${at})`,
  )
    .orderBy('repair.bookedAt', 'DESC')
    .addOrderBy('repair.id', 'ASC')
    .take(most)
    .getMany();
}

/** Charges in whose number, repair, spare or type every word stands, the newest first. */
export function searchCharges(
  manager: EntityManager,
  workshopId: string,
  words: readonly LookedWord[],
  most: number,
): Promise<Charge[]> {
  const builder = manager.createQueryBuilder(Charge, 'charge').where('charge.workshopId = :workshopId', { workshopId });
  return everyWord(
    builder,
    words,
    (at) =>
      `LOWER(charge.number) LIKE :word${at} OR LOWER(charge.repairRef) LIKE :word${at} OR charge.moduleTypeId IN (:...types${at}) OR charge.spareId IN (:...spares${at})`,
  )
    .orderBy('charge.createdAt', 'DESC')
    .addOrderBy('charge.id', 'ASC')
    .take(most)
    .getMany();
}
