import type { EntityManager } from 'typeorm';
import type { Member } from '../deps';
import type { ChargeFile } from './charge-file';
import { bare, titleOf } from './charge-words';
import { settle, type Announcement } from './charge-write';

/**
 * Ends a charge that is not begun, within the transaction that takes its spare away. It is stopped with the reason and
 * not dropped: who waits for it sees on the board what became of it, and its log says why.
 * @returns what is announced after the commit
 */
export function takeOffQueue(
  manager: EntityManager,
  member: Member,
  file: ChargeFile,
  reason: string,
  now: number,
): Promise<Announcement> {
  const { charge, spare } = file;
  Object.assign(charge, { stage: 'stopped', stoppedAt: now, closedAt: now, stopReason: reason, rev: charge.rev + 1 });
  const text = `Taken off before it began: ${bare(reason)}. ${spare.label} is in quarantine. ${titleOf(charge)} has no charge now.`;
  return settle(manager, file, now, [{ at: now, kind: 'stopped', personId: member.personId, text }]);
}
