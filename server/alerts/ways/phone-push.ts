/** Pushes to phones by the service of Expo: a ticket says that it was accepted, the receipt later what came of it. */
import { Expo, type ExpoPushErrorReceipt } from 'expo-server-sdk';
import type { Dispatcher } from 'undici';
import type { PushDevice } from '../../entities/push-device';
import { bodyOf, type Message } from '../message';
import { reasonOf, type Sent } from './way';

/** What the phone's service keeps while the phone is off, s. */
const KEPT_S = 12 * 3600;

export interface PhonePush {
  send(device: Pick<PushDevice, 'address'>, message: Message): Promise<Sent>;
  /** What came of tickets; one that is not there has no receipt yet. */
  receipts(ticketIds: readonly string[]): Promise<Map<string, Sent>>;
}

/** @param httpAgent makes the connections, with its limits of time */
export function makePhonePush(httpAgent: Dispatcher, accessToken: string | null): PhonePush {
  const expo = new Expo({
    httpAgent,
    // The outbox tries again by itself; here a call is one try.
    retryMinTimeout: 1,
    ...(accessToken === null ? {} : { accessToken }),
  });
  return {
    async send({ address }, message) {
      const { alertId, turn, level, title, name, path } = message;
      try {
        const [ticket] = await expo.sendPushNotificationsAsync([
          {
            to: address,
            title: `${name}: ${title}`,
            body: bodyOf(message),
            data: { id: alertId, turn, url: path },
            sound: 'default',
            priority: level === 'tell' ? 'default' : 'high',
            ttl: KEPT_S,
            // A later turn of the same alert takes the place of the earlier one.
            collapseId: alertId,
            tag: alertId,
          },
        ]);
        if (!ticket) return { kind: 'failed', reason: 'The push service gave no ticket.' };
        return ticket.status === 'ok' ? { kind: 'sent', ticketId: ticket.id } : answerOf(ticket);
      } catch (error) {
        const { statusCode } = error as { statusCode?: number };
        const lasting = statusCode !== undefined && statusCode >= 400 && statusCode < 500 && statusCode !== 429;
        return { kind: lasting ? 'refused' : 'failed', reason: reasonOf(error) };
      }
    },
    async receipts(ticketIds) {
      const found = new Map<string, Sent>();
      for (const chunk of expo.chunkPushNotificationReceiptIds([...ticketIds]))
        for (const [id, receipt] of Object.entries(await expo.getPushNotificationReceiptsAsync(chunk)))
          found.set(id, receipt.status === 'ok' ? { kind: 'sent' } : answerOf(receipt));
      return found;
    },
  };
}

function answerOf({ message, details }: ExpoPushErrorReceipt): Sent {
  const reason = reasonOf(message);
  switch (details?.error) {
    case 'DeviceNotRegistered':
      return { kind: 'gone', reason };
    case 'MessageTooBig':
    case 'InvalidCredentials':
    case 'DeveloperError':
      return { kind: 'refused', reason };
    default:
      return { kind: 'failed', reason };
  }
}
