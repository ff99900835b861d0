import type { Deps } from '../deps';
import type { OutboxEntry } from '../entities/outbox-entry';
import { makeDueLoop, type DueLoop } from '../live/due-loop';
import {
  earliestEntryDueAt,
  freeLeases,
  leaseEntries,
  listDueEntries,
  settleEntry,
} from '../repositories/outbox.repository';
import { deletePushDevices } from '../repositories/push-devices.repository';
import { toInstant } from '../services/instants';
import { inTransaction } from '../services/unit-of-work';
import { backoffMs, LONGEST_WAIT_MS, MOST_TRIES } from './backoff';
import { readEntryFile } from './entry-file';
import { RECEIPT_AFTER_MS, readReceipts } from './read-receipts';
import { sendEntry, type Sending } from './send-entry';
import type { Ways } from './ways/all';

/** So long a process may work on an entry; longer than its slowest connection takes, ms. */
const LEASE_MS = 5 * 60_000;
const AT_ONCE = 16;

export interface DispatcherDeps extends Pick<Deps, 'dataSource' | 'clock' | 'log' | 'hub'> {
  ways: Ways;
  /** 0…1, for the waits between tries; seeded in tests. */
  random: () => number;
}

/**
 * Brings the outbox out of the house. An entry is leased, sent outside of any transaction, and then marked: a process that
 * dies in between leaves a lease, and the next one sends it again under the same id. So everything is sent at least once,
 * and the receiver tells by the id what it has already.
 */
export function makeDispatcher(deps: DispatcherDeps): DueLoop {
  const { dataSource, clock, log } = deps;

  async function work(): Promise<number> {
    let done = 0;
    for (;;) {
      const entries = await inTransaction(deps, async (manager) => {
        const now = clock.now();
        const furthest = { due: now + LONGEST_WAIT_MS, lease: now + LEASE_MS };
        const due = await listDueEntries(manager, now, furthest, AT_ONCE);
        const leasedUntil = now + LEASE_MS;
        if (due.length > 0)
          await leaseEntries(
            manager,
            due.map((entry) => entry.id),
            leasedUntil,
          );
        return due.map((entry) => ({ ...entry, leasedUntil }));
      });
      if (entries.length === 0) break;
      await Promise.all(entries.map((entry) => bring(entry)));
      done += entries.length;
    }
    return done + (await readReceipts(deps, clock.now()));
  }

  async function bring(entry: OutboxEntry): Promise<void> {
    try {
      const now = clock.now();
      const file = await readEntryFile(dataSource.manager, entry, now);
      if (typeof file === 'string') await settle(entry, { state: 'dropped', reason: file, endedAt: now });
      else if (file.heldUntil !== null)
        await settle(entry, { dueAt: file.heldUntil, heldAt: entry.heldAt ?? now, leasedUntil: null });
      else await note(entry, await sendEntry(deps.ways, entry, file, now), clock.now());
    } catch (error) {
      // The lease is left: it is tried again when that is over, and what failed here is in the log.
      log.error({ err: error, entryId: entry.id }, 'an entry of the outbox could not be worked on');
    }
  }

  async function note(entry: OutboxEntry, sending: Sending, now: number): Promise<void> {
    const tries = entry.tries + 1;
    const { reached, tickets, reason } = sending;
    const base = { reached, tickets, reason, tries, leasedUntil: null };
    const receipts = tickets.length > 0 ? { receiptDueAt: now + RECEIPT_AFTER_MS } : {};
    const givenUp = sending.kind === 'failed' && tries >= MOST_TRIES;
    if (sending.kind === 'off') await settle(entry, { ...base, state: 'dropped', endedAt: now });
    else if (sending.kind === 'sent' || (givenUp && reached.length > 0))
      await settle(entry, { ...base, ...receipts, state: 'sent', endedAt: now }, sending.gone);
    else if (sending.kind === 'failed' && !givenUp)
      await settle(
        entry,
        { ...base, ...receipts, dueAt: now + backoffMs(tries, deps.random, sending.afterMs) },
        sending.gone,
      );
    else {
      await settle(entry, { ...base, state: 'dead', endedAt: now }, sending.gone);
      const { workshopId, alertId, way, personId } = entry;
      log.warn({ workshopId, alertId, way, personId, reason, tries }, 'an alert could not be brought to somebody');
      deps.hub.toWorkshop(workshopId, 'alert:changed', { id: alertId, at: toInstant(now) });
    }
  }

  const settle = (entry: OutboxEntry, patch: Partial<OutboxEntry>, gone: readonly string[] = []): Promise<void> =>
    inTransaction(deps, async (manager) => {
      await settleEntry(manager, entry.workshopId, entry.id, 'waiting', patch);
      await deletePushDevices(manager, entry.workshopId, gone);
    });

  const loop = makeDueLoop({
    clock,
    log,
    name: 'the dispatcher',
    work,
    nextDueAt: () => earliestEntryDueAt(dataSource.manager),
  });
  return {
    ...loop,
    async start() {
      // One server holds the folder, so whatever is leased now was left by one that ended.
      await inTransaction(deps, freeLeases);
      await loop.start();
    },
  };
}
