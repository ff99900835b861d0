import type { ChargeDto, LookInInput } from '@/shared/contract/charge';
import type { Deps, Member } from '../deps';
import { insertLookIns } from '../repositories/charge-rows.repository';
import { actInstant } from './charge-instants';
import { isUnderWay } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { markVisit } from './charge-visit';
import { bare } from './charge-words';
import { changeCharge } from './charge-write';
import { newId } from './ids';

/**
 * Somebody has looked in, now or at the instant they say. Where no look-in was due then the visit is kept beside the
 * planned ones, which stay.
 * @throws DomainError 409 where the charge is not under way, 400 for an instant that cannot be
 */
export function lookIn(deps: Deps, member: Member, id: string, input: LookInInput, now: number): Promise<ChargeDto> {
  return changeCharge(deps, member, id, null, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (!isUnderWay(charge.stage)) throw wrongStage(write, 'Nobody has to look in.');
    const note = input.note ?? null;
    const at = actInstant(file, input.at, now, { at: charge.startedAt ?? now, name: 'the start' });
    const asked = await markVisit(write, at, note);
    const known = file.lookIns.some((one) => one.dueAt === at);
    if (!asked && !known) {
      const extra = {
        id: newId(),
        workshopId: charge.workshopId,
        chargeId: charge.id,
        dueAt: at,
        doneAt: at,
        personId: member.personId,
        note,
      };
      await insertLookIns(manager, [extra]);
      file.lookIns = [...file.lookIns, extra].sort((one, other) => one.dueAt - other.dueAt);
    }
    write.note('look-in', note === null ? 'Looked in.' : `Looked in: ${bare(note)}.`, at);
  });
}
