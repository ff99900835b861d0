/** What the owner was advised, and what became of it: with the customer's name where it was declined. */
import { advisedOutcomeNames, type AdvisedInput, type RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { AdvisedItem } from '../entities/advised-item';
import { notFound } from '../errors/domain-error';
import { deleteAdvised, insertAdvised, updateAdvised } from '../repositories/repair-rows.repository';
import { bare, lowerFirst } from './charge-words';
import { newId } from './ids';
import type { RepairFile } from './repair-file';
import { changeRepair } from './repair-write';

/** After the hand-over too: the owner often answers only with the keys in the hand. */
const whileIn = ['open', 'handed-over'] as const;

/** 'declined by the owner, 8 September, agreed by T. Varga' */
function became({ outcome, detail, agreedBy }: AdvisedInput): string {
  const agreed = agreedBy === null ? '' : `, agreed by ${agreedBy}`;
  return `${lowerFirst(advisedOutcomeNames[outcome])}${detail === null ? '' : `, ${bare(detail)}`}${agreed}`;
}

function itemOf({ advised }: RepairFile, itemId: string): AdvisedItem {
  const item = advised.find(({ id }) => id === itemId);
  if (!item) throw notFound('This advice');
  return item;
}

export const addAdvised = (
  deps: Deps,
  member: Member,
  id: string,
  input: AdvisedInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { whileIn }, async ({ manager, note }) => {
    const { workshopId, personId } = member;
    const agreedAt = input.agreedBy === null ? null : now;
    await insertAdvised(manager, { id: newId(), workshopId, repairId: id, ...input, agreedAt, at: now, personId });
    note(`advised: ${bare(input.text)}, ${became(input)}`);
  });

/** @throws DomainError 404, 412 */
export const changeAdvised = (
  deps: Deps,
  member: Member,
  { repairId, itemId }: { repairId: string; itemId: string },
  rev: number,
  input: AdvisedInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, repairId, now, { rev, whileIn }, async ({ manager, file, note }) => {
    const item = itemOf(file, itemId);
    // The name agrees to what was done with it then: said of another outcome it is a new agreement.
    const same = item.agreedBy === input.agreedBy && item.outcome === input.outcome && item.text === input.text;
    const agreedAt = input.agreedBy === null ? null : same ? item.agreedAt : now;
    await updateAdvised(manager, member.workshopId, itemId, { ...input, agreedAt });
    note(`advised: ${bare(input.text)}, now ${became(input)}`);
  });

/** @throws DomainError 404, 412 */
export const removeAdvised = (
  deps: Deps,
  member: Member,
  { repairId, itemId }: { repairId: string; itemId: string },
  rev: number,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, repairId, now, { rev, whileIn }, async ({ manager, file, note }) => {
    const item = itemOf(file, itemId);
    await deleteAdvised(manager, member.workshopId, itemId);
    note(`advice taken back: ${bare(item.text)}, ${became(item)}`);
  });
