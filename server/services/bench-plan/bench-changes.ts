/** The changes of the plan as screens show them, and whether they can be undone. */
import type { EntityManager } from 'typeorm';
import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import type { BenchChange } from '../../entities/bench-change';
import { personRefs } from '../../repositories/person-refs.repository';
import { findCharge } from '../../repositories/charges.repository';
import { isWaitingToStart } from '../charge-stages';
import { titleOf } from '../charge-words';
import { toInstant } from '../instants';

/** Why a change cannot be undone; null: nothing of it was touched since. */
export async function lastingBecause(manager: EntityManager, change: BenchChange): Promise<string | null> {
  if (change.undoneAt !== null) return 'It is undone already.';
  for (const { chargeId, revAfter } of change.moved) {
    const charge = await findCharge(manager, change.workshopId, chargeId);
    if (charge === null) return 'One of its charges was dropped since.';
    if (!isWaitingToStart(charge.stage)) return `${titleOf(charge)} is begun.`;
    if (charge.rev !== revAfter) return `${titleOf(charge)} was changed since.`;
  }
  return null;
}

export async function benchChangeDto(manager: EntityManager, change: BenchChange): Promise<BenchChangeDto> {
  const people = await personRefs(manager, change.workshopId);
  return {
    id: change.id,
    text: change.text,
    by: people.get(change.personId) ?? { id: change.personId, name: 'somebody' },
    at: toInstant(change.at),
    lastingBecause: await lastingBecause(manager, change),
  };
}
