/** The wait of a repair: the time in which it can do nothing but wait for its module. */
import type { EntityManager } from 'typeorm';
import type { RepairWait } from '../entities/repair-wait';
import { insertWait, updateWait } from '../repositories/repair-rows.repository';
import { newId } from './ids';
import { repairFacts, type RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';

/** Its target is taken, its module is known, and no module is ready: the pack is open for nothing but that. */
const waitsForModule = ({ repair }: RepairFile, facts: RepairFacts): boolean =>
  repair.handedOverAt === null &&
  repair.deletedAt === null &&
  facts.target !== null &&
  facts.ready === null &&
  facts.asItIs === null &&
  !facts.disagree;

/**
 * Begins or ends the wait where the rows say so, in the transaction of their cause. It ends when the module was found ready,
 * not when somebody typed it.
 */
export async function syncWait(manager: EntityManager, file: RepairFile, now: number): Promise<void> {
  const facts = repairFacts(file);
  const { repair } = file;
  const open = file.waits.find(({ toAt }) => toAt === null) ?? null;
  const waits = waitsForModule(file, facts);
  if (waits === (open !== null)) return;
  if (open !== null) {
    const ended = facts.ready?.charge.readyAt ?? facts.ready?.charge.closedAt ?? facts.asItIs?.at ?? now;
    open.toAt = Math.min(now, Math.max(open.fromAt, ended));
    await updateWait(manager, repair.workshopId, open.id, { toAt: open.toAt });
    return;
  }
  const wait: RepairWait = {
    id: newId(),
    workshopId: repair.workshopId,
    repairId: repair.id,
    fromAt: now,
    toAt: null,
    modulePosition: facts.failing,
    correctionReason: null,
    correctedAt: null,
    correctedById: null,
  };
  await insertWait(manager, wait);
  file.waits.unshift(wait);
}
