import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import type { Deps, Member } from '../../deps';
import { conflict, notFound } from '../../errors/domain-error';
import { findBenchChange, markUndone } from '../../repositories/bench-changes.repository';
import { announce } from '../charge-write';
import { toInstant } from '../instants';
import { refusingTaken } from '../unique-taken';
import { inTransaction } from '../unit-of-work';
import { benchChangeDto, lastingBecause } from './bench-changes';
import { moveWithin } from './move-charges';

/**
 * Takes a change of the plan back: its charges stand where they stood before it.
 * @throws DomainError 404 unknown; 409 where one of them was touched since, or its old place is taken, with the reason
 */
export async function undoBenchChange(deps: Deps, member: Member, id: string, now: number): Promise<BenchChangeDto> {
  const undone = inTransaction(deps, async (manager) => {
    const change = await findBenchChange(manager, member.workshopId, id);
    if (!change) throw notFound('This change');
    const lasting = await lastingBecause(manager, change);
    if (lasting !== null) throw conflict('lasting', `This cannot be undone. ${lasting}`);
    const moves = change.moved.map(({ chargeId, revAfter, before }) => ({ chargeId, rev: revAfter, ...before }));
    const done = await moveWithin(manager, deps, member, moves, (sentences) => sentences.join('; '), now);
    // The way back is no change of its own that could be undone in turn.
    await markUndone(manager, member.workshopId, done.change.id, now);
    await markUndone(manager, member.workshopId, change.id, now);
    return { change: { ...change, undoneAt: now }, announcements: done.announcements };
  });
  const { change, announcements } = await refusingTaken(undone);
  for (const one of announcements) announce(deps, one, now);
  deps.hub.toWorkshop(member.workshopId, 'bench:changed', { at: toInstant(now) });
  return benchChangeDto(deps.dataSource.manager, change);
}
