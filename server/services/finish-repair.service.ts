/** The end of a repair: what became of the module taken out, the hand-over, the archive, and deleting. */
import { groupsAt } from '@/shared/contract/pack';
import { moduleFateNames, type RemovedModuleInput, type RepairPageDto } from '@/shared/contract/repair';
import { repairStepNames } from '@/shared/contract/repair-steps';
import type { Deps, Member } from '../deps';
import { conflict, invalid } from '../errors/domain-error';
import { insertRemovedModule } from '../repositories/repair-rows.repository';
import { findRepairWithSpare } from '../repositories/repairs.repository';
import { bare, listText, lowerFirst, titleOf } from './charge-words';
import { dropWorkOfRepair, restoreWorkOfRepair } from './finish-work.service';
import { newId } from './ids';
import { conditionBlock, conditionOf } from './module-conditions';
import { repairFacts } from './repair-facts';
import { repairSteps } from './repair-steps';
import { changeRepair } from './repair-write';

/** Records what became of a module that was taken out. @throws DomainError 400 a position that the pack does not have */
export const recordRemoved = (
  deps: Deps,
  member: Member,
  id: string,
  input: RemovedModuleInput,
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { whileIn: ['open', 'handed-over'] }, async ({ manager, file, note }) => {
    const { modulePosition, fate } = input;
    if (groupsAt(file.repair, modulePosition).length === 0)
      throw invalid({ modulePosition: `This pack has no module ${modulePosition}. Type another.` });
    const seen = conditionOf(file, modulePosition);
    if (fate === 'stock' && seen !== null)
      throw invalid({
        fate: `Module ${modulePosition} is ${seen.condition} on a photo and is no spare. Scrap it, or put it into quarantine.`,
      });
    const { workshopId, personId } = member;
    await insertRemovedModule(manager, { id: newId(), workshopId, repairId: id, ...input, at: now, personId });
    const why = input.note === null ? '' : `: ${bare(input.note)}`;
    note(`module ${modulePosition} ${lowerFirst(moduleFateNames[fate])}${why}`);
  });

/**
 * Hands the repair over. Whatever of its steps is missing needs the note to say why.
 * @throws DomainError 409 with what is missing
 */
export const handOverRepair = (
  deps: Deps,
  member: Member,
  id: string,
  input: { note: string | null },
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { stock: true, bench: true }, async ({ manager, file, note }) => {
    const condition = conditionBlock(file, repairFacts(file).failing);
    if (condition !== null) throw conflict('module_condition', condition.text);
    const missing = repairSteps(file).flatMap(({ step, state }) =>
      state === 'done' ? [] : [lowerFirst(repairStepNames[step])],
    );
    if (missing.length > 0 && input.note === null)
      throw conflict(
        'steps_missing',
        `Not done yet: ${listText(missing)}. Do ${missing.length === 1 ? 'it' : 'them'}, or say in the note why it is handed over without.`,
        { missing },
      );
    Object.assign(file.repair, { handedOverAt: now, handedOverById: member.personId, handOverNote: input.note });
    await dropWorkOfRepair(manager, member, file.repair, now);
    const without = missing.length === 0 ? '' : ` without ${listText(missing)}`;
    note(`handed over${without}${input.note === null ? '' : `: ${bare(input.note)}`}`);
  });

/** Puts a repair that is over into the archive, or takes it out. @throws DomainError 409 while it is open */
export const archiveRepair = (
  deps: Deps,
  member: Member,
  id: string,
  input: { archived: boolean },
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(deps, member, id, now, { whileIn: ['handed-over'] }, ({ file, note }) => {
    if ((file.repair.archivedAt !== null) === input.archived) return;
    file.repair.archivedAt = input.archived ? now : null;
    note(input.archived ? 'archived' : 'taken out of the archive');
  });

/** Deletes a repair; it can be brought back. @throws DomainError 409 while a charge is open for it */
export const deleteRepair = (
  deps: Deps,
  member: Member,
  id: string,
  input: { reason: string },
  now: number,
): Promise<RepairPageDto> =>
  changeRepair(
    deps,
    member,
    id,
    now,
    { whileIn: ['open', 'handed-over'], stock: true, bench: true },
    async ({ manager, file, note }) => {
      const { open } = repairFacts(file);
      if (open !== null && file.repair.handedOverAt === null)
        throw conflict(
          'charge_open',
          `${open.spare.label} is on ${titleOf(open.charge)} for it. Drop, stop or fit that charge first.`,
        );
      Object.assign(file.repair, { deletedAt: now, deletedById: member.personId, deleteReason: input.reason });
      await dropWorkOfRepair(manager, member, file.repair, now);
      note(`deleted: ${bare(input.reason)}`);
    },
  );

/** Brings a deleted repair back. A spare that another repair has reserved meanwhile stays there. */
export const restoreRepair = (deps: Deps, member: Member, id: string, now: number): Promise<RepairPageDto> =>
  changeRepair(
    deps,
    member,
    id,
    now,
    { whileIn: ['deleted'], stock: true, bench: true },
    async ({ manager, file, note }) => {
      const { repair, spare } = file;
      const other =
        spare === null || repair.handedOverAt !== null
          ? null
          : await findRepairWithSpare(manager, member.workshopId, spare.id);
      await restoreWorkOfRepair(manager, repair);
      Object.assign(repair, { deletedAt: null, deletedById: null, deleteReason: null });
      if (other !== null && spare !== null) Object.assign(repair, { spareId: null, spareAt: null, spareById: null });
      const lost = other === null || spare === null ? '' : `, without ${spare.label}: ${other.number} has it`;
      note(`brought back${lost}`);
    },
  );
