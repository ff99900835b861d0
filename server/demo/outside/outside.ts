/** The services outside, as the demo has them: on this machine, so that nothing that it sends leaves it. */
import type https from 'node:https';
import type { Dispatcher } from 'undici';
import type { SentWay } from '@/shared/contract/alert-settings';
import type { MailSettings } from '../../alerts/ways/e-mail';
import type { Clock } from '../../clock';
import { startMailCatcher, type CaughtLetter } from './mail-catcher';
import { startPhoneService, type PhoneMessage } from './phone-service';
import { startPushService, type FakeBrowser, type TakenPush } from './push-service';

/** A message as it came to a service. */
export interface SentOut {
  /** Counts them, from 1. */
  number: number;
  at: number;
  way: SentWay;
  /** Mailbox, address of the push service, or token of the phone. */
  to: string;
  alertId: string;
  turn: number;
  title: string;
  text: string;
  html: string | null;
}

export interface Outside {
  mail: MailSettings;
  /** Connections of the two push services: all end on this machine. */
  push: https.Agent;
  phones: Dispatcher;
  /** A browser subscribes at the service of the demo, in place of that of its maker. */
  subscribe(name: string): FakeBrowser;
  /** A phone gets its token. */
  phoneToken(name: string): string;
  /** It is one of those phones. */
  isPhone(token: string): boolean;
  since: number;
  /** The last of what was sent since then, oldest first. */
  sent: readonly SentOut[];
  close(): Promise<void>;
}

/** Older messages than these are forgotten. */
const KEPT = 300;
/** Leads nowhere: names under `invalid` do not exist (RFC 2606). */
const PUSH_ORIGIN = 'https://push.demo.invalid';
/** How the token of a phone of the demo begins. */
const PHONE = 'ExponentPushToken[demo-';

type Message = Omit<SentOut, 'number' | 'at'>;

/** 'alert.turn@domain' in angle brackets, as a letter is marked; one of no alert has an id of its own there. */
function ofLetter({ to, headers, parts }: CaughtLetter): Message {
  const [, whole = ''] = /^<(.+)@/.exec(headers['message-id'] ?? '') ?? [];
  const [, alertId = whole, turn = '0'] = /^(?!digest\.)(.+)\.(\d+)$/.exec(whole) ?? [];
  return {
    way: 'e-mail',
    to: to.join(', '),
    alertId,
    turn: Number(turn),
    title: headers.subject ?? '',
    text: parts['text/plain'] ?? '',
    html: parts['text/html'] ?? null,
  };
}

const ofPush = ({ browser, notice }: TakenPush): Message => ({
  way: 'browser-push',
  to: endpointOf(browser),
  alertId: notice.id,
  turn: notice.turn,
  title: notice.title,
  text: notice.body,
  html: null,
});

const ofPhone = ({ to, title, body, data }: PhoneMessage): Message => ({
  ...{ way: 'phone-push', to, title, text: body, html: null },
  ...{ alertId: data.id, turn: data.turn },
});

const endpointOf = (browser: string): string => `${PUSH_ORIGIN}/push/${encodeURIComponent(browser)}`;

/** @param secret of this installation: browsers that have subscribed before a restart are known again */
export async function startOutside(secret: Buffer, clock: Clock): Promise<Outside> {
  const sent: SentOut[] = [];
  let count = 0;
  const keep = (message: Message): void => {
    sent.push({ ...message, number: ++count, at: clock.now() });
    // The services keep what they took, for whoever looks at them; here nobody does.
    for (const list of [push.taken, phones.taken, phones.asked, mail.caught]) list.splice(0, list.length - KEPT);
    sent.splice(0, sent.length - KEPT);
  };
  const [push, phones, mail] = await Promise.all([
    startPushService((taken) => keep(ofPush(taken)), { secret, origin: PUSH_ORIGIN }),
    startPhoneService((taken) => keep(ofPhone(taken))),
    startMailCatcher((taken) => keep(ofLetter(taken))),
  ]);
  return {
    mail: { url: mail.url, from: 'Bidewell <alerts@demo.invalid>' },
    push: push.everywhere,
    phones: phones.dispatcher,
    subscribe: push.subscribe,
    phoneToken: (name) => `${PHONE}${name}]`,
    isPhone: (token) => token.startsWith(PHONE),
    since: clock.now(),
    sent,
    close: async () => {
      await Promise.all([push.close(), phones.close(), mail.close()]);
    },
  };
}
