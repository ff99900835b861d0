import type { CorrectWaitInput, RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import { conflict, invalid, notFound } from '../errors/domain-error';
import { updateWait } from '../repositories/repair-rows.repository';
import { bare, clockText } from './charge-words';
import { changeRepair } from './repair-write';

/**
 * Corrects a wait that was recorded by itself; reason and name stay with it, and the log has what stood there before.
 * @throws DomainError 412 stale, 404 unknown, 400 a time to come, or one inside another wait; 409 a second one without end
 */
export const correctWait = (
  deps: Deps,
  member: Member,
  ids: { repairId: string; waitId: string },
  rev: number,
  input: CorrectWaitInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(
    deps,
    member,
    ids.repairId,
    now,
    { rev, whileIn: ['open', 'handed-over'] },
    async ({ manager, file, note }) => {
      const wait = file.waits.find(({ id }) => id === ids.waitId);
      if (!wait) throw notFound('This wait');
      const from = Date.parse(input.from);
      const to = input.to === null ? null : Date.parse(input.to);
      const toCome = 'This time is still to come. Type when it was.';
      if (from > now) throw invalid({ from: toCome });
      if (to !== null && to > now) throw invalid({ to: toCome });
      if (to === null && wait.toAt !== null) throw invalid({ to: 'This wait has ended. Type when.' });
      if (to !== null && wait.toAt === null)
        throw conflict('waits_still', 'It waits still, and ends by itself. Correct its beginning only.');
      const other = file.waits.find(
        (one) => one.id !== wait.id && from < (one.toAt ?? Infinity) && (to ?? Infinity) > one.fromAt,
      );
      const clock = (at: number | null): string => (at === null ? 'now' : clockText(at, file.workshop.zone, now));
      if (other) throw invalid({ from: `Another wait goes from ${clock(other.fromAt)} to ${clock(other.toAt)}.` });
      await updateWait(manager, member.workshopId, wait.id, {
        fromAt: from,
        toAt: to,
        correctionReason: input.reason,
        correctedAt: now,
        correctedById: member.personId,
      });
      const was = `${clock(wait.fromAt)}–${clock(wait.toAt)}`;
      note(`corrected the wait ${was} to ${clock(from)}–${clock(to)}: ${bare(input.reason)}`);
    },
  );
