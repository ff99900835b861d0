/**
 * The one way a repair is changed: in one transaction its rows are read, the revision is compared, the act is done, its wait
 * follows, a line goes into its log and the revision rises. What screens must hear is announced after the commit.
 */
import type { EntityManager } from 'typeorm';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { Repair } from '../entities/repair';
import type { RepairEvent } from '../entities/repair-event';
import { conflict, stale } from '../errors/domain-error';
import { insertRepairEvents } from '../repositories/repair-rows.repository';
import { updateRepair } from '../repositories/repairs.repository';
import { announceBench, announceStock } from './announce';
import { newId } from './ids';
import { toInstant } from './instants';
import { repairPage, repairPageOf } from './repair-dto';
import { loadRepairFile, type RepairFile } from './repair-file';
import { syncWait } from './repair-waits';
import { refusingTaken } from './unique-taken';
import { inTransaction } from './unit-of-work';
import { recordWaits } from './waits/record-waits';

export interface RepairWrite {
  manager: EntityManager;
  file: RepairFile;
  member: Member;
  now: number;
  /** Writes a line into the log of the repair. */
  note: (text: string, at?: number) => void;
}

interface RepairChange {
  /** Revision the person saw; left out where the act does not depend on it. */
  rev?: number;
  /** States in which it may be done; left out: only while it is open. */
  whileIn?: readonly ('open' | 'handed-over' | 'deleted')[];
  /** The list of spares has to be read again. */
  stock?: boolean;
  /** Other work goes or comes with it. */
  bench?: boolean;
}

/**
 * Does one act of a person on a repair.
 * @throws DomainError 404 unknown, 412 with the present repair where somebody else was quicker, 409 where it is over
 */
export async function changeRepair(
  deps: Deps,
  member: Member,
  id: string,
  now: number,
  change: RepairChange,
  act: (write: RepairWrite) => Promise<void> | void,
): Promise<RepairPageDto> {
  const { workshopId } = member;
  const work = inTransaction(deps, async (manager) => {
    const file = await loadRepairFile(manager, workshopId, id);
    if (change.rev !== undefined && file.repair.rev !== change.rev) throw stale(await repairPage(manager, file, now));
    refuseOver(file.repair, change.whileIn ?? ['open']);
    const lines: { text: string; at: number }[] = [];
    await act({ manager, file, member, now, note: (text, at = now) => void lines.push({ text, at }) });
    await settleRepair(manager, await rewritten(manager, file), now, member.personId, lines);
    return repairPageOf(manager, workshopId, id, now);
  });
  const dto = await refusingTaken(work);
  announceRepair(deps, workshopId, dto, now);
  if (change.stock) announceStock(deps, member, now);
  if (change.bench) announceBench(deps, workshopId, now);
  return dto;
}

/** Writes the repair's own columns, and reads what the act has added to it. */
async function rewritten(manager: EntityManager, { repair }: RepairFile): Promise<RepairFile> {
  const { id, workshopId, createdAt: _made, ...columns } = repair;
  await updateRepair(manager, workshopId, id, columns);
  return loadRepairFile(manager, workshopId, id);
}

/**
 * Brings a repair to what its rows say: wait, search text, revision, log.
 * @param lines what happened, in words
 */
export async function settleRepair(
  manager: EntityManager,
  file: RepairFile,
  now: number,
  personId: string | null,
  lines: readonly { text: string; at: number }[],
): Promise<void> {
  const { repair } = file;
  const { workshopId } = repair;
  await syncWait(manager, file, now);
  await recordWaits(
    manager,
    file.workshop,
    file.charges.map(({ charge }) => charge),
  );
  repair.rev += 1;
  repair.searchText = searchText(file);
  await updateRepair(manager, workshopId, repair.id, { rev: repair.rev, searchText: repair.searchText });
  await insertRepairEvents(
    manager,
    lines.map(({ text, at }, place): RepairEvent => ({
      id: newId(),
      workshopId,
      repairId: repair.id,
      at,
      personId,
      text,
      createdAt: now + place,
    })),
  );
}

function searchText({ repair, personIds, people, spare, charges }: RepairFile): string {
  const names = personIds.map((id) => people.get(id)?.name ?? '');
  const labels = charges.map((charge) => charge.spare.label);
  return [repair.number, repair.vehicle, repair.bay, repair.customerName, spare?.label, ...names, ...labels]
    .filter((one) => one)
    .join(' ')
    .toLowerCase();
}

function refuseOver(repair: Repair, allowed: readonly string[]): void {
  const state = repair.deletedAt !== null ? 'deleted' : repair.handedOverAt !== null ? 'handed-over' : 'open';
  if (allowed.includes(state)) return;
  const sentences = {
    deleted: `${repair.number} is deleted. A manager can bring it back.`,
    'handed-over': `${repair.number} is handed over. Book a new repair for what comes now.`,
    open: `${repair.number} is open still. Hand it over first.`,
  };
  throw conflict('wrong_state', sentences[state]);
}

export function announceRepair(
  deps: Pick<Deps, 'hub'>,
  workshopId: string,
  repair: { id: string; rev: number },
  now: number,
): void {
  deps.hub.toWorkshop(workshopId, 'repair:changed', { id: repair.id, rev: repair.rev, at: toInstant(now) });
}
