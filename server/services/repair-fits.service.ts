/** A spare that rests within the tolerance of the target is fitted as it is. */
import { groupsAt } from '@/shared/contract/pack';
import type { FitAsItIsInput, RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import { conflict } from '../errors/domain-error';
import { updateSpare } from '../repositories/charge-stock.repository';
import { insertFittedSpare } from '../repositories/repair-rows.repository';
import { bare, cellText, listText } from './charge-words';
import { newId } from './ids';
import { refuseDisagree } from './repair-disagree';
import { repairFacts } from './repair-facts';
import { changeRepair } from './repair-write';
import { spareAsItIs } from './spare-as-it-is';

/**
 * Keeps who has fitted the reserved spare without a charge, and when, with the volts by which it needed none.
 * @throws DomainError 412 stale, 409 where the spare needs a charge, or has to be read once more first
 */
export const fitAsItIs = (
  deps: Deps,
  member: Member,
  id: string,
  rev: number,
  input: FitAsItIsInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { rev, stock: true }, async ({ manager, file, note }) => {
    const facts = repairFacts(file);
    refuseDisagree(file, facts);
    const found = await spareAsItIs(manager, file, now);
    if (found === null) throw conflict('needs_charge', whyNot(file.spare?.label ?? null));
    const { spare, target, reading } = found;
    if (found.old)
      throw conflict(
        'reading_old',
        `${spare.label} was within the tolerance when it was read last, more than a day ago. Read its groups once more, then fit it.`,
      );
    const { workshopId, personId } = member;
    const modulePosition =
      facts.failing !== null && groupsAt(file.repair, facts.failing).length > 0 ? facts.failing : null;
    await insertFittedSpare(manager, {
      ...{ id: newId(), workshopId, repairId: id, spareId: spare.id, modulePosition, groupVolts: reading.groupVolts },
      ...{ targetVolts: target.volts, toleranceMillivolts: target.toleranceMillivolts },
      ...{ note: input.note, at: now, personId },
    });
    await updateSpare(manager, workshopId, spare.id, { fittedAt: now });
    const place = modulePosition === null ? '' : ` as module ${modulePosition}`;
    const why = input.note === null ? '' : `. ${bare(input.note)}`;
    note(`fitted ${spare.label}${place} without a charge, at ${listText(reading.groupVolts.map(cellText))}${why}`);
  });

const whyNot = (label: string | null): string =>
  label === null
    ? 'No spare is reserved for this repair. Choose one first.'
    : `${label} cannot be fitted as it is: only a spare in stock whose last reading is within the tolerance of the target can. Plan a charge.`;
