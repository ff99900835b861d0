import type { ChargeDto } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import { insertLookIns } from '../repositories/charge-rows.repository';
import { isUnderWay } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { markVisit } from './charge-visit';
import { bare } from './charge-words';
import { changeCharge } from './charge-write';
import { newId } from './ids';

/**
 * Somebody has looked in. Where no look-in was due the visit is kept beside the planned ones, which stay.
 * @throws DomainError 409 where the charge is not under way
 */
export function lookIn(
  deps: Deps,
  member: Member,
  id: string,
  input: { note?: string | null },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, null, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (!isUnderWay(charge.stage)) throw wrongStage(write, 'Nobody has to look in.');
    const note = input.note ?? null;
    const asked = await markVisit(write, now, note);
    const known = file.lookIns.some((one) => one.dueAt === now);
    if (!asked && !known) {
      const extra = {
        id: newId(),
        workshopId: charge.workshopId,
        chargeId: charge.id,
        dueAt: now,
        doneAt: now,
        personId: member.personId,
        note,
      };
      await insertLookIns(manager, [extra]);
      file.lookIns = [...file.lookIns, extra].sort((one, other) => one.dueAt - other.dueAt);
    }
    write.note('look-in', note === null ? 'Looked in.' : `Looked in: ${bare(note)}.`);
  });
}
