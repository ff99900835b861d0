/** Pushes to browsers by the services that their makers run (RFC 8030, 8291, 8292). */
import type https from 'node:https';
import webPush, { WebPushError } from 'web-push';
import type { PushDevice } from '../../entities/push-device';
import { bodyOf, type Message } from '../message';
import type { VapidKeys } from '../vapid';
import { reasonOf, type Sent } from './way';

/** What a service keeps for a browser that is off, s: later the alert is old news. */
const KEPT_S = 12 * 3600;
const TIMEOUT_MS = 15_000;

export interface BrowserPush {
  send(device: Pick<PushDevice, 'address' | 'p256dh' | 'auth'>, message: Message): Promise<Sent>;
}

/** A topic has at most 32 letters: an id without its dashes is as long. */
export const topicOf = (alertId: string): string => alertId.replaceAll('-', '').slice(0, 32);

/** @param agent makes the connections; one that lets in public addresses only, but in tests */
export function makeBrowserPush(keys: VapidKeys, agent: https.Agent): BrowserPush {
  return {
    async send({ address, p256dh, auth }, message) {
      const { alertId, turn, level, title, name, path } = message;
      const notice = {
        ...{ title: `${name}: ${title}`, body: bodyOf(message), url: path, tag: alertId },
        ...{ id: alertId, turn },
      };
      try {
        await webPush.sendNotification(
          { endpoint: address, keys: { p256dh: p256dh ?? '', auth: auth ?? '' } },
          JSON.stringify(notice),
          {
            vapidDetails: { subject: keys.subject, publicKey: keys.publicKey, privateKey: keys.privateKey },
            TTL: KEPT_S,
            // What waits at the service for a browser that is off is replaced, not doubled.
            topic: topicOf(alertId),
            urgency: level === 'tell' ? 'normal' : 'high',
            timeout: TIMEOUT_MS,
            agent,
          },
        );
        return { kind: 'sent' };
      } catch (error) {
        return error instanceof WebPushError ? answerOf(error) : { kind: 'failed', reason: reasonOf(error) };
      }
    },
  };
}

function answerOf({ statusCode, body, headers }: WebPushError): Sent {
  const reason = `The push service said ${statusCode}${body ? `: ${reasonOf(body)}` : ''}.`;
  if (statusCode === 404 || statusCode === 410) return { kind: 'gone', reason };
  const afterMs = Number(headers['retry-after']) * 1000;
  if (statusCode === 429 || statusCode >= 500) return { kind: 'failed', reason, ...(afterMs > 0 ? { afterMs } : {}) };
  return { kind: 'refused', reason };
}
