import type { CapacityAnswerInput, SpareDto } from '@/shared/contract/spare';
import type { Deps, Member } from '../deps';
import { conflict, notFound, stale } from '../errors/domain-error';
import { updateSpare } from '../repositories/charge-stock.repository';
import { findSpareCapacity, updateSpareCapacity } from '../repositories/spare-capacities.repository';
import { announceStock } from './announce';
import { knownSpare, spareDtoOf } from './spare-file';
import { inTransaction } from './unit-of-work';

/**
 * A person takes what a charge has found as the spare's capacity, in the place of what was known, or leaves it.
 * @throws DomainError 404 unknown, 412 stale, 409 where it waits for no answer
 */
export async function answerCapacity(
  deps: Deps,
  member: Member,
  ids: { spareId: string; capacityId: string },
  rev: number,
  { answer }: CapacityAnswerInput,
  now: number,
): Promise<SpareDto> {
  const { workshopId } = member;
  const dto = await inTransaction(deps, async (manager) => {
    const spare = await knownSpare(manager, workshopId, ids.spareId);
    const found = await findSpareCapacity(manager, workshopId, spare.id, ids.capacityId);
    if (!found) throw notFound('This capacity');
    if (spare.rev !== rev) throw stale(await spareDtoOf(manager, workshopId, spare.id));
    if (found.state !== 'found')
      throw conflict(
        'answered_already',
        found.state === 'used' ? 'It is taken already.' : 'It was left already. Type it as the capacity to use it.',
        await spareDtoOf(manager, workshopId, spare.id),
      );
    await updateSpareCapacity(manager, workshopId, found.id, { state: answer === 'take' ? 'used' : 'left' });
    const taken = { capacityAh: found.ampHours, capacitySdAh: found.sdAh, capacitySource: 'measured' as const };
    await updateSpare(manager, workshopId, spare.id, answer === 'take' ? taken : { capacitySdAh: spare.capacitySdAh });
    return spareDtoOf(manager, workshopId, spare.id);
  });
  announceStock(deps, member, now);
  return dto;
}
