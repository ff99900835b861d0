import { createTransport, type SendMailOptions } from 'nodemailer';
import type { Message } from '../message';
import { letterOf, type Letter } from './letter';
import { reasonOf, type Sent } from './way';

export interface MailSettings {
  /** smtp:// or smtps:// with name and password where the server wants them. */
  url: string;
  /** 'Bidewell <alerts@workshop.example>' */
  from: string;
}

export interface EMail {
  send(address: string, message: Message): Promise<Sent>;
  /** A letter that is no alert; `id` is the same however often it is tried, `stopUrl` ends such letters without asking. */
  sendLetter(address: string, letter: Letter & { id: string; stopUrl: string | null }): Promise<Sent>;
  close(): void;
}

const TIMEOUT_MS = 15_000;

/** The part after the @ of the sender: what ids of letters end in. */
const domainOf = (from: string): string => /@([^>\s]+)/.exec(from)?.[1] ?? 'bidewell.invalid';

/** @param site address that people open, for the link; null: none */
export function makeEMail({ url, from }: MailSettings, site: string | null): EMail {
  const transport = createTransport({
    url,
    pool: true,
    maxConnections: 2,
    connectionTimeout: TIMEOUT_MS,
    greetingTimeout: TIMEOUT_MS,
    socketTimeout: TIMEOUT_MS,
  });
  const deliver = async (mail: SendMailOptions): Promise<Sent> => {
    try {
      await transport.sendMail({ from, ...mail });
      return { kind: 'sent' };
    } catch (error) {
      const { responseCode } = error as { responseCode?: number };
      // 5xx: this mailbox or this letter never. What fails before that (sign-in, connection) may be put right.
      const lasting = responseCode !== undefined && responseCode >= 550 && responseCode < 560;
      return { kind: lasting ? 'refused' : 'failed', reason: reasonOf(error) };
    }
  };
  const automatic = { 'Auto-Submitted': 'auto-generated' };
  return {
    send: (address, message) =>
      deliver({
        to: address,
        ...letterOf(message, site),
        // A mailbox shows a letter with the same id once; those of one alert stand together.
        messageId: `<${message.alertId}.${message.turn}@${domainOf(from)}>`,
        references: `<${message.alertId}@${domainOf(from)}>`,
        priority: message.level === 'alarm' ? 'high' : 'normal',
        headers: automatic,
      }),
    sendLetter: (address, { id, stopUrl, ...letter }) =>
      deliver({
        to: address,
        ...letter,
        messageId: `<${id}@${domainOf(from)}>`,
        headers: {
          ...automatic,
          // RFC 8058: the mail program's own button for it.
          ...(stopUrl === null
            ? {}
            : { 'List-Unsubscribe': `<${stopUrl}>`, 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' }),
        },
      }),
    close: () => transport.close(),
  };
}
