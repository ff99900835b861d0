import { createTransport } from 'nodemailer';
import type { Message } from '../message';
import { letterOf } from './letter';
import { reasonOf, type Sent } from './way';

export interface MailSettings {
  /** smtp:// or smtps:// with name and password where the server wants them. */
  url: string;
  /** 'Bidewell <alerts@workshop.example>' */
  from: string;
}

export interface EMail {
  send(address: string, message: Message): Promise<Sent>;
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
  return {
    async send(address, message) {
      const id = `${message.alertId}.${message.turn}@${domainOf(from)}`;
      try {
        await transport.sendMail({
          from,
          to: address,
          ...letterOf(message, site),
          // A mailbox shows a letter with the same id once; those of one alert stand together.
          messageId: `<${id}>`,
          references: `<${message.alertId}@${domainOf(from)}>`,
          priority: message.level === 'alarm' ? 'high' : 'normal',
          headers: { 'Auto-Submitted': 'auto-generated' },
        });
        return { kind: 'sent' };
      } catch (error) {
        const { responseCode } = error as { responseCode?: number };
        // 5xx: this mailbox or this letter never. What fails before that (sign-in, connection) may be put right.
        const lasting = responseCode !== undefined && responseCode >= 550 && responseCode < 560;
        return { kind: lasting ? 'refused' : 'failed', reason: reasonOf(error) };
      }
    },
    close: () => transport.close(),
  };
}
