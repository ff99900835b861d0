/** What the server of the demo has sent, as its own stand-ins of mailboxes, browsers and phones have got it. */
import type { SentWay } from './alert-settings';
import type { Instant } from './common';

export interface MailboxEntryDto {
  /** Rises with what comes. */
  number: number;
  at: Instant;
  way: SentWay;
  /** Whose mailbox or device it is; null: it is nobody's any more. */
  to: { name: string | null; address: string };
  /** Null: a letter of no alert. */
  alertId: string | null;
  turn: number;
  title: string;
  text: string;
  /** Of a letter, its HTML. */
  html: string | null;
  /** The same alert has come to the same receiver by the same way before: receivers show it once, by its id. */
  again: boolean;
}

export interface MailboxDto {
  /** Start of the server; what came before is forgotten. */
  since: Instant;
  /** Newest first. */
  entries: MailboxEntryDto[];
  /** Who asks has a phone of the demo. */
  hasPhone: boolean;
}
