import type { SearchDto, SearchHitDto, SearchQuery } from '@/shared/contract/search';
import type { Deps, Member } from '../deps';
import { listModuleTypes } from '../repositories/module-types.repository';
import { searchCharges, searchRepairs, type LookedWord } from '../repositories/search.repository';
import { listSpares, openChargesBySpare } from '../repositories/spares.repository';
import { titleOf } from './charge-words';
import { toInstant } from './instants';
import { may } from './may';
import { stateOf } from './repair-dto';
import { whereIs } from './spares-dto';

/** Most of each kind: who does not see it among these types another letter. */
const MOST = 8;

/** What is looked for itself first, then what begins with it. */
const fitsBest =
  <T>(typed: string, nameOf: (one: T) => string) =>
  (one: T, other: T): number => {
    const rank = (name: string) => (name === typed ? 0 : name.startsWith(typed) ? 1 : 2);
    return rank(nameOf(one).toLowerCase()) - rank(nameOf(other).toLowerCase());
  };

/**
 * Looks through the repairs, spares and charges of a workshop: every word has to stand in it somewhere: number, vehicle,
 * bay, customer, people, module type, label, shelf place. Deleted repairs only for who may bring them back.
 */
export async function search(deps: Deps, member: Member, { q }: SearchQuery): Promise<SearchDto> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const typed = q.toLowerCase();
  const types = await listModuleTypes(manager, workshopId);
  const spares = await listSpares(manager, workshopId);
  const typeNames = new Map(types.map(({ id, name }) => [id, name]));
  const words = [...new Set(typed.split(/\s+/))].map((word): LookedWord => ({
    word,
    moduleTypeIds: types.filter(({ name }) => name.toLowerCase().includes(word)).map(({ id }) => id),
    spareIds: spares.filter(({ label }) => label.toLowerCase().includes(word)).map(({ id }) => id),
  }));
  const deletedToo = await may(manager, member, 'repair:delete');
  const repairs = await searchRepairs(manager, workshopId, words, deletedToo, MOST + 1);
  const charges = await searchCharges(manager, workshopId, words, MOST + 1);
  const open = await openChargesBySpare(manager, workshopId);
  const foundSpares = spares.filter((spare) => {
    const text = [spare.label, typeNames.get(spare.moduleTypeId), spare.shelfPlace].join(' ').toLowerCase();
    return words.every(({ word }) => text.includes(word));
  });
  const labels = new Map(spares.map(({ id, label }) => [id, label]));
  const hits: SearchHitDto[] = [
    ...repairs
      .sort(fitsBest(typed, ({ number }) => number))
      .slice(0, MOST)
      .map((repair) => ({
        ...{ kind: 'repair' as const, id: repair.id, number: repair.number, vehicle: repair.vehicle },
        ...{ bay: repair.bay, customerName: repair.customerName, state: stateOf(repair) },
      })),
    ...foundSpares
      .sort(fitsBest(typed, ({ label }) => label))
      .slice(0, MOST)
      .map((spare) => ({
        ...{ kind: 'spare' as const, id: spare.id, label: spare.label, shelfPlace: spare.shelfPlace },
        ...{ typeName: typeNames.get(spare.moduleTypeId) ?? '', where: whereIs(spare, open.get(spare.id)) },
      })),
    ...charges
      .sort(fitsBest(typed, ({ number }) => number))
      .slice(0, MOST)
      .map((charge) => ({
        ...{ kind: 'charge' as const, id: charge.id, title: titleOf(charge), number: charge.number },
        ...{ spareLabel: labels.get(charge.spareId) ?? '', stage: charge.stage, at: toInstant(charge.createdAt) },
      })),
  ];
  return { hits, more: [repairs, foundSpares, charges].some(({ length }) => length > MOST) };
}
