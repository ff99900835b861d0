/** A customer's own data: taken out, or erased. The technical record of the repairs stays as it is. */
import type { EntityManager } from 'typeorm';
import type { CustomerExportDto, EraseCustomerInput } from '@/shared/contract/customer';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { Deps, Member } from '../deps';
import type { Repair } from '../entities/repair';
import { notFound } from '../errors/domain-error';
import { allRepairs, forgetAnswersOfRepairs, rewriteTexts } from '../repositories/customers.repository';
import {
  advisedOfRepairs,
  eventsOfRepairs,
  photosOfRepairs,
  removedOfRepairs,
} from '../repositories/repair-rows.repository';
import { findRepair, updateRepair } from '../repositories/repairs.repository';
import { workOfRepairs } from '../repositories/work.repository';
import { findWorkshop } from '../repositories/workshops.repository';
import { announceBench } from './announce';
import { withoutAnswer } from './idempotency.service';
import { toInstant, toOptionalInstant } from './instants';
import { repairPageOf } from './repair-dto';
import { loadRepairFile } from './repair-file';
import { announceRepair, settleRepair } from './repair-write';
import { inTransaction } from './unit-of-work';

/** What stands in a text where a name or a contact was. */
const ERASED = '[erased]';

type Named = Pick<Repair, 'customerName' | 'customerContact'>;
const keyOf = ({ customerName, customerContact }: Named): string =>
  JSON.stringify([customerName, customerContact].map((text) => text?.trim().toLowerCase() ?? null));
const isNamed = ({ customerName, customerContact }: Named): boolean =>
  customerName !== null || customerContact !== null;

/**
 * The repairs of the customer of one: same name and same contact. A name alone is too little to take two for one, unless
 * neither has a contact. A repair that names nobody stands for itself.
 */
async function repairsOfCustomer(manager: EntityManager, workshopId: string, repair: Repair): Promise<Repair[]> {
  if (!isNamed(repair)) return [repair];
  return (await allRepairs(manager, workshopId)).filter((one) => keyOf(one) === keyOf(repair));
}

async function knownRepair(manager: EntityManager, workshopId: string, id: string): Promise<Repair> {
  const repair = await findRepair(manager, workshopId, id);
  if (!repair) throw notFound('This repair');
  return repair;
}

/** Everything that is kept of the customer of a repair. @throws DomainError 404 */
export async function exportCustomer(deps: Deps, member: Member, id: string, now: number): Promise<CustomerExportDto> {
  const { manager } = deps.dataSource;
  const { workshopId } = member;
  const repair = await knownRepair(manager, workshopId, id);
  const repairs = await repairsOfCustomer(manager, workshopId, repair);
  const ids = repairs.map((one) => one.id);
  const removed = await removedOfRepairs(manager, workshopId, ids);
  const photos = await photosOfRepairs(manager, workshopId, ids);
  const advised = await advisedOfRepairs(manager, workshopId, ids);
  const events = await eventsOfRepairs(manager, workshopId, ids);
  const work = await workOfRepairs(manager, workshopId, ids);
  return {
    exportedAt: toInstant(now),
    workshop: (await findWorkshop(manager, workshopId))?.name ?? '',
    name: repair.customerName,
    contact: repair.customerContact,
    repairs: repairs.map((one) => ({
      number: one.number,
      vehicle: one.vehicle,
      bookedAt: toInstant(one.bookedAt),
      promisedAt: toOptionalInstant(one.promisedAt),
      handedOverAt: toOptionalInstant(one.handedOverAt),
      note: one.note,
      handOverNote: one.handOverNote,
      removed: (removed.get(one.id) ?? []).map(({ modulePosition, fate, note, at }) => ({
        ...{ modulePosition, fate, note, at: toInstant(at) },
      })),
      advised: (advised.get(one.id) ?? []).map(({ text, outcome, detail, agreedBy, agreedAt }) => ({
        ...{ text, outcome, detail, agreedBy, agreedAt: toOptionalInstant(agreedAt) },
      })),
      work: work
        .filter(({ repairId }) => repairId === one.id)
        .map(({ number, title, note, createdAt }) => ({ number, title, note, addedAt: toInstant(createdAt) })),
      photos: (photos.get(one.id) ?? []).map((photo) => ({
        ...{ at: toInstant(photo.at), caption: photo.caption, address: `/api/photos/${photo.id}` },
      })),
      log: (events.get(one.id) ?? []).map(({ at, text }) => ({ at: toInstant(at), text })),
    })),
  };
}

/** Takes what names the customer out of a text, in whatever case it was typed. */
function cleanerOf(repairs: readonly Named[], agreedBy: readonly string[]): (text: string) => string {
  const named = repairs.flatMap((one) => [one.customerName, one.customerContact]);
  const secrets = [...new Set([...named, ...agreedBy])]
    .map((text) => text?.trim() ?? '')
    // One letter would be found everywhere, and tells nothing.
    .filter((text) => text.length > 1)
    .sort((a, b) => b.length - a.length)
    .map((text) => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&'));
  if (secrets.length === 0) return (text) => text;
  // A name within a longer word is another word.
  const any = new RegExp(`(?<![\\p{L}\\p{N}])(?:${secrets.join('|')})(?![\\p{L}\\p{N}])`, 'giu');
  return (text) => text.replace(any, ERASED);
}

/**
 * Erases the customer of a repair from all repairs of the same name and contact: the two fields, and wherever they stand
 * in a note, a caption or the log. What was measured and done stays, with who did it. Erasing again changes nothing.
 * @throws DomainError 404
 */
export async function eraseCustomer(
  deps: Deps,
  member: Member,
  id: string,
  { reason }: EraseCustomerInput,
  now: number,
): Promise<RepairPageDto> {
  const { workshopId, personId } = member;
  const { page, erased } = await inTransaction(deps, async (manager) => {
    const repair = await knownRepair(manager, workshopId, id);
    const repairs = await repairsOfCustomer(manager, workshopId, repair);
    const advised = await advisedOfRepairs(
      manager,
      workshopId,
      repairs.map((one) => one.id),
    );
    const agreedBy = (one: Repair): string[] =>
      (advised.get(one.id) ?? []).flatMap((item) =>
        item.agreedBy === null || item.agreedBy === ERASED ? [] : [item.agreedBy],
      );
    const named = repairs.filter((one) => isNamed(one) || agreedBy(one).length > 0);
    const cleaned = cleanerOf(named, named.flatMap(agreedBy));
    const cleanedOr = (text: string | null) => (text === null ? null : cleaned(text));
    for (const one of named) {
      await updateRepair(manager, workshopId, one.id, {
        ...{ customerName: null, customerContact: null, vehicle: cleaned(one.vehicle), bay: cleanedOr(one.bay) },
        ...{ note: cleanedOr(one.note), handOverNote: cleanedOr(one.handOverNote) },
        ...{ deleteReason: cleanedOr(one.deleteReason), eraseReason: cleaned(reason) },
        ...{ erasedAt: now, erasedById: personId },
      });
      await rewriteTexts(manager, workshopId, one.id, cleaned, ERASED);
      const file = await loadRepairFile(manager, workshopId, one.id);
      await settleRepair(manager, file, now, personId, [{ text: 'customer’s data erased', at: now }]);
    }
    if (named.length > 0)
      await forgetAnswersOfRepairs(manager, workshopId, { status: withoutAnswer, response: { body: null } });
    const pages = [];
    for (const one of named) pages.push(await repairPageOf(manager, workshopId, one.id, now));
    return { page: await repairPageOf(manager, workshopId, id, now), erased: pages };
  });
  for (const one of erased) announceRepair(deps, workshopId, one, now);
  if (erased.length > 0) announceBench(deps, workshopId, now);
  return page;
}
