/** Sends an entry of the outbox by its way, to every device that its person has for it. */
import type { OutboxEntry, PushTicket } from '../entities/outbox-entry';
import type { EntryFile } from './entry-file';
import { messageOf } from './message';
import type { Ways } from './ways/all';
import { reasonOf, type Sent } from './ways/way';

export interface Sending {
  /** Devices that it has reached, in earlier tries too. */
  reached: string[];
  tickets: PushTicket[];
  /** Devices that are not there any more. */
  gone: string[];
  /** `sent`: it was accepted somewhere, and nothing is left that may still work. */
  kind: 'sent' | 'failed' | 'refused' | 'off';
  reason: string | null;
  afterMs?: number;
}

export async function sendEntry(ways: Ways, entry: OutboxEntry, file: EntryFile, now: number): Promise<Sending> {
  const message = messageOf(file.alert, entry, file.workshop, now);
  const none = { reached: entry.reached, tickets: entry.tickets, gone: [] };
  if (entry.way === 'e-mail') {
    if (ways.eMail === null) return { ...none, kind: 'off', reason: 'This server sends no e-mail.' };
    return { ...none, ...verdict(await guarded(ways.eMail.send(file.person.email, message))) };
  }
  const way = entry.way === 'phone-push' ? ways.phonePush : ways.browserPush;
  const answers: { deviceId: string; sent: Sent }[] = [];
  for (const device of file.devices)
    answers.push({ deviceId: device.id, sent: await guarded(way.send(device, message)) });
  return together(entry, answers);
}

/** What a way throws is a failure like any other. */
const guarded = (sending: Promise<Sent>): Promise<Sent> =>
  sending.catch((error: unknown): Sent => ({ kind: 'failed', reason: reasonOf(error) }));

const verdict = (sent: Sent): Pick<Sending, 'kind' | 'reason' | 'afterMs'> => {
  if (sent.kind === 'sent') return { kind: 'sent', reason: null };
  if (sent.kind === 'failed') return sent;
  return { kind: 'refused', reason: sent.reason };
};

function together(entry: OutboxEntry, answers: readonly { deviceId: string; sent: Sent }[]): Sending {
  const of = (kind: Sent['kind']): string[] =>
    answers.filter(({ sent }) => sent.kind === kind).map(({ deviceId }) => deviceId);
  const tickets = answers.flatMap(({ deviceId, sent }) =>
    sent.kind === 'sent' && sent.ticketId !== undefined ? [{ deviceId, ticketId: sent.ticketId }] : [],
  );
  const reached = [...entry.reached, ...of('sent')];
  const base = { reached, tickets: [...entry.tickets, ...tickets], gone: of('gone') };
  const failed = answers.map(({ sent }) => sent).find((sent) => sent.kind === 'failed');
  if (failed?.kind === 'failed') return { ...base, ...verdict(failed) };
  if (reached.length > 0) return { ...base, kind: 'sent', reason: null };
  const why = answers.map(({ sent }) => sent).find((sent) => sent.kind !== 'sent');
  const reason = why === undefined ? 'No device is left to send it to.' : why.reason;
  return { ...base, kind: 'refused', reason };
}
