/** What came of pushes to phones, some minutes after their service has accepted them. */
import type { OutboxEntry } from '../entities/outbox-entry';
import { listReceiptsDue, settleEntry } from '../repositories/outbox.repository';
import { deletePushDevices } from '../repositories/push-devices.repository';
import { toInstant } from '../services/instants';
import { inTransaction } from '../services/unit-of-work';
import { backoffMs, MOST_TRIES } from './backoff';
import type { DispatcherDeps } from './dispatcher';
import { reasonOf, type Sent } from './ways/way';

/** Receipts are there some minutes after their ticket. */
export const RECEIPT_AFTER_MS = 15 * 60_000;
/** They are kept for a day: after that nobody knows. */
const FORGOTTEN_MS = 24 * 3600_000;
const AT_ONCE = 200;

/** @returns how many entries were looked at */
export async function readReceipts(deps: DispatcherDeps, now: number): Promise<number> {
  const entries = await listReceiptsDue(deps.dataSource.manager, now, AT_ONCE);
  if (entries.length === 0) return 0;
  let found: Map<string, Sent> | string;
  try {
    const ids = entries.flatMap(({ tickets }) => tickets.map(({ ticketId }) => ticketId));
    found = await deps.ways.phonePush.receipts(ids);
  } catch (error) {
    found = reasonOf(error);
    deps.log.warn({ err: error }, 'receipts of pushes could not be read');
  }
  for (const entry of entries) {
    if (typeof found === 'string') await askLater(deps, entry, now);
    else await noteReceipts(deps, entry, found, now);
  }
  return entries.length;
}

const askLater = (deps: DispatcherDeps, entry: OutboxEntry, now: number): Promise<void> =>
  inTransaction(deps, (manager) =>
    settleEntry(manager, entry.workshopId, entry.id, entry.state, { receiptDueAt: now + RECEIPT_AFTER_MS }),
  );

async function noteReceipts(
  deps: DispatcherDeps,
  entry: OutboxEntry,
  found: ReadonlyMap<string, Sent>,
  now: number,
): Promise<void> {
  const { workshopId, id, alertId } = entry;
  const answers = entry.tickets.map((ticket) => ({ ticket, sent: found.get(ticket.ticketId) }));
  const forgotten = now - (entry.endedAt ?? entry.createdAt) >= FORGOTTEN_MS;
  const open = forgotten ? [] : answers.filter(({ sent }) => sent === undefined).map(({ ticket }) => ticket);
  const failed = answers.flatMap(({ ticket, sent }) =>
    sent === undefined || sent.kind === 'sent' ? [] : [{ ticket, sent }],
  );
  const gone = failed.filter(({ sent }) => sent.kind === 'gone').map(({ ticket }) => ticket.deviceId);
  const missed = failed.map(({ ticket }) => ticket.deviceId);
  const reached = entry.reached.filter((deviceId) => !missed.includes(deviceId));
  const again = failed.some(({ sent }) => sent.kind === 'failed') && entry.tries < MOST_TRIES;
  const [first] = failed;
  const patch: Partial<OutboxEntry> = {
    reached,
    tickets: open,
    receiptDueAt: open.length === 0 ? null : now + RECEIPT_AFTER_MS,
    ...(first === undefined ? {} : { reason: first.sent.reason }),
  };
  const lost = entry.state === 'sent' && failed.length > 0 && (again || (reached.length === 0 && open.length === 0));
  if (lost && again)
    Object.assign(patch, { state: 'waiting', dueAt: now + backoffMs(entry.tries, deps.random), endedAt: null });
  else if (lost) Object.assign(patch, { state: 'dead', endedAt: now });
  await inTransaction(deps, async (manager) => {
    await settleEntry(manager, workshopId, id, entry.state, patch);
    await deletePushDevices(manager, workshopId, gone);
  });
  if (patch.state === 'dead') deps.hub.toWorkshop(workshopId, 'alert:changed', { id: alertId, at: toInstant(now) });
}
