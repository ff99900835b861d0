/** Rows that may name a customer. */
import { Like, type EntityManager } from 'typeorm';
import { AdvisedItem } from '../entities/advised-item';
import { IdempotencyKey } from '../entities/idempotency-key';
import { Photo } from '../entities/photo';
import { RemovedModule } from '../entities/removed-module';
import { Repair } from '../entities/repair';
import { RepairEvent } from '../entities/repair-event';
import { RepairWait } from '../entities/repair-wait';
import { Work } from '../entities/work';

/** All repairs of a workshop, the deleted ones too; the last booked first. */
export const allRepairs = (manager: EntityManager, workshopId: string): Promise<Repair[]> =>
  manager.find(Repair, { where: { workshopId }, order: { bookedAt: 'DESC', id: 'ASC' } });

/**
 * Rewrites every free text that hangs on a repair.
 *
 * @param cleaned what stands there in place of a text
 * @param nobody what stands in place of the name that a customer has typed as agreement
 */
export async function rewriteTexts(
  manager: EntityManager,
  workshopId: string,
  repairId: string,
  cleaned: (text: string) => string,
  nobody: string,
): Promise<void> {
  const of = { workshopId, repairId };
  for (const { id, text, detail, agreedBy } of await manager.findBy(AdvisedItem, of))
    await manager.update(
      AdvisedItem,
      { workshopId, id },
      {
        text: cleaned(text),
        detail: detail === null ? null : cleaned(detail),
        agreedBy: agreedBy === null ? null : nobody,
      },
    );
  for (const { id, text } of await manager.findBy(RepairEvent, of))
    if (cleaned(text) !== text) await manager.update(RepairEvent, { workshopId, id }, { text: cleaned(text) });
  for (const { id, note } of await manager.findBy(RemovedModule, of))
    if (note !== null && cleaned(note) !== note)
      await manager.update(RemovedModule, { workshopId, id }, { note: cleaned(note) });
  for (const { id, caption } of await manager.findBy(Photo, of))
    if (caption !== null && cleaned(caption) !== caption)
      await manager.update(Photo, { workshopId, id }, { caption: cleaned(caption) });
  for (const { id, title, note, dropReason } of await manager.findBy(Work, of)) {
    const [told, dropped] = [note, dropReason].map((text) => (text === null ? null : cleaned(text)));
    await manager.update(Work, { workshopId, id }, { title: cleaned(title), note: told, dropReason: dropped });
  }
  for (const { id, correctionReason } of await manager.findBy(RepairWait, of))
    if (correctionReason !== null && cleaned(correctionReason) !== correctionReason)
      await manager.update(RepairWait, { workshopId, id }, { correctionReason: cleaned(correctionReason) });
}

/**
 * Empties the stored answers of writes on repairs and on work for them: each holds the whole of it. Who asks again is told
 * to read it anew.
 */
export async function forgetAnswersOfRepairs(
  manager: EntityManager,
  workshopId: string,
  empty: { status: number; response: { body: null } },
): Promise<void> {
  for (const route of ['%/repairs%', '%/api/work', '%/api/work/%'])
    await manager.update(IdempotencyKey, { workshopId, route: Like(route) }, empty);
}
