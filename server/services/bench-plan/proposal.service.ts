import type { BenchChangeDto, ProposalDto } from '@/shared/contract/bench-plan';
import type { Deps, Member } from '../../deps';
import { DomainError, stale } from '../../errors/domain-error';
import { loadFile } from '../charge-file';
import { benchChangeDto } from './bench-changes';
import { benchModel } from './bench-model';
import { daysOf } from './days';
import { loadGround } from './ground';
import { moveCharges, type ChargeMove } from './move-charges';
import { noteShown, shownMoves, type ShownMove } from './proposal-book';
import { proposalDto } from './proposal-words';
import { betterPlan } from './proposals';
import { plannedAgain } from './way-input';
import { workshopForPlans } from '../../repositories/workshop-for-plans.repository';

/** A better plan than today's; null: there is none. */
export async function proposal(deps: Deps, member: Member, now: number): Promise<ProposalDto | null> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const { zone } = await workshopForPlans(manager, workshopId);
  const ground = await loadGround(manager, workshopId, daysOf(zone, undefined, 1, now), now);
  const found = await betterPlan(await benchModel(manager, deps.bench, ground), deps.bench);
  if (found === null) return null;
  noteShown(deps.dataSource, workshopId, found);
  return proposalDto(found);
}

/**
 * Carries a proposal out as it was shown.
 * @throws DomainError 412 with the proposal that holds now (null: none) where anything it stands on has changed
 */
export async function acceptProposal(
  deps: Deps,
  member: Member,
  proposalId: string,
  now: number,
): Promise<BenchChangeDto> {
  const shown = shownMoves(deps.dataSource, member.workshopId, proposalId);
  const stales = async () => stale({ proposal: await proposal(deps, member, now) });
  if (shown === null) throw await stales();
  try {
    const moves: ChargeMove[] = [];
    for (const one of shown) {
      const move = await moveOf(deps, member, one, now);
      if (move === null) throw await stales();
      moves.push(move);
    }
    return await benchChangeDto(deps.dataSource.manager, await moveCharges(deps, member, moves, together, now));
  } catch (error) {
    // A charge that was changed, begun or dropped, a channel that was taken: the proposal was made for another bench.
    const overtaken = error instanceof DomainError && [404, 409, 412].includes(error.status);
    throw overtaken && !(error.extra.present as { proposal?: unknown } | undefined)?.proposal ? await stales() : error;
  }
}

const together = (sentences: string[]): string => sentences.join('; ');

/** The move with its plan for that time; null: it cannot be done there any more. */
async function moveOf(deps: Deps, member: Member, shown: ShownMove, now: number): Promise<ChargeMove | null> {
  const { manager } = deps.dataSource;
  const file = await loadFile(manager, member.workshopId, shown.chargeId);
  const clipOnAt = Math.max(now, shown.at);
  const { ask, frozen } = await plannedAgain(manager, file, clipOnAt, now);
  const option = await deps.bench.option(ask, shown.channelIds);
  if (option === null) return null;
  return { chargeId: shown.chargeId, rev: shown.rev, stage: 'queued', queuedAt: now, option, frozen, clipOnAt };
}
