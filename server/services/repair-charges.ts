/** Charges that belong to repairs: which one, and what the repair hears of its charge. */
import type { EntityManager } from 'typeorm';
import type { KeepPlanRequest } from '@/shared/contract/plan';
import type { Member } from '../deps';
import type { Charge } from '../entities/charge';
import { conflict, invalid } from '../errors/domain-error';
import { findRepair, findRepairNumbered, updateRepair } from '../repositories/repairs.repository';
import type { ChargeFile } from './charge-file';
import type { Note } from './charge-progress';
import { bare } from './charge-words';
import { refuseDisagree } from './repair-disagree';
import { repairFacts } from './repair-facts';
import { loadRepairFile, type RepairFile } from './repair-file';
import { settleRepair } from './repair-write';

/**
 * The open repair that a plan is kept for: the one it names by its id, else the one whose number it names, else that of
 * the charge it goes on from.
 * @returns null where it is for none that the workshop keeps here
 * @throws DomainError 400 unknown, 409 where it is over, or where its two sources disagree
 */
export async function repairOfPlan(
  manager: EntityManager,
  workshopId: string,
  request: Pick<KeepPlanRequest, 'repairId' | 'repairRef'>,
  goesOn: Pick<Charge, 'repairId'> | null,
): Promise<RepairFile | null> {
  const named = request.repairId ?? null;
  if (named !== null) {
    const repair = await findRepair(manager, workshopId, named);
    if (!repair) throw invalid({ repairId: 'This repair is not on the list. Choose another.' });
    if (repair.handedOverAt !== null || repair.deletedAt !== null)
      throw conflict('wrong_state', `${repair.number} is over. Book a new repair for what comes now.`);
    return undecided(await loadRepairFile(manager, workshopId, named));
  }
  const repair =
    request.repairRef !== null
      ? await findRepairNumbered(manager, workshopId, request.repairRef)
      : goesOn?.repairId
        ? await findRepair(manager, workshopId, goesOn.repairId)
        : null;
  if (!repair || repair.handedOverAt !== null || repair.deletedAt !== null) return null;
  return undecided(await loadRepairFile(manager, workshopId, repair.id));
}

function undecided(file: RepairFile): RepairFile {
  refuseDisagree(file, repairFacts(file));
  return file;
}

/** Gives a charge to its repair, and the spare with it. With the repair's id its number, module and people stand for all else. */
export async function giveToRepair(
  manager: EntityManager,
  member: Member,
  charge: Charge,
  file: RepairFile,
  byId: boolean,
  now: number,
): Promise<void> {
  const { repair, personIds, people } = file;
  const { failing } = repairFacts(file);
  charge.repairId = repair.id;
  charge.repairRef = repair.number;
  charge.modulePosition = byId ? (failing ?? charge.modulePosition) : (charge.modulePosition ?? failing);
  const able = personIds.filter((id) => people.get(id)?.disabledAt === null);
  // Whoever of its people keeps the plan keeps the charge; else the one who is asked first.
  if (byId && able.length > 0 && !able.includes(member.personId)) charge.personId = able[0]!;
  if (repair.spareId === charge.spareId) return;
  await updateRepair(manager, repair.workshopId, repair.id, {
    spareId: charge.spareId,
    spareAt: now,
    spareById: member.personId,
  });
}

/** What a line in the log of a charge is in that of its repair; null: nothing that a repair hears of. */
function repairLine({ charge, spare }: ChargeFile, note: Note): string | null {
  const lines: Record<string, () => string> = {
    planned: () => `planned ${spare.label}: ${bare(note.text.replace(/^Planned: /, '').split('. ')[0] ?? '')}`,
    queued: () => `queued ${spare.label}`,
    started: () => `clipped ${spare.label} on`,
    'check-due': () => `${spare.label} has rested: its check is due`,
    ready: () => `checked ${spare.label}: ready`,
    outside: () => `checked ${spare.label}: outside the tolerance`,
    fitted: () => `fitted ${spare.label}${charge.modulePosition === null ? '' : ` as module ${charge.modulePosition}`}`,
    shelved: () => `put ${spare.label} back on the shelf`,
    stopped: () => `stopped the charge of ${spare.label}: ${bare(charge.stopReason ?? '')}`,
  };
  return lines[note.kind]?.() ?? null;
}

/** What of a charge's repair is announced after the commit. */
export interface RepairRev {
  id: string;
  rev: number;
}

/**
 * Lets the repair of a charge follow it, in the same transaction: its log, its wait, its revision.
 * @returns null where the charge belongs to none
 */
export async function followCharge(
  manager: EntityManager,
  file: ChargeFile,
  now: number,
  notes: readonly Note[],
): Promise<RepairRev | null> {
  const { charge } = file;
  if (charge.repairId === null) return null;
  const lines = notes.flatMap((note) => {
    const text = repairLine(file, note);
    return text === null ? [] : [{ text, at: note.at }];
  });
  if (lines.length === 0 && charge.stage === file.storedStage) {
    const repair = await findRepair(manager, charge.workshopId, charge.repairId);
    return repair === null ? null : { id: repair.id, rev: repair.rev };
  }
  const repairFile = await loadRepairFile(manager, charge.workshopId, charge.repairId);
  await settleRepair(
    manager,
    repairFile,
    now,
    notes.find(({ personId }) => personId !== null)?.personId ?? null,
    lines,
  );
  return { id: charge.repairId, rev: repairFile.repair.rev };
}

/** The same where the plan of a charge is dropped. */
export async function followDrop(
  manager: EntityManager,
  member: Member,
  { charge, spare }: ChargeFile,
  now: number,
): Promise<RepairRev | null> {
  if (charge.repairId === null) return null;
  const file = await loadRepairFile(manager, charge.workshopId, charge.repairId);
  await settleRepair(manager, file, now, member.personId, [{ text: `dropped the plan of ${spare.label}`, at: now }]);
  return { id: charge.repairId, rev: file.repair.rev };
}
