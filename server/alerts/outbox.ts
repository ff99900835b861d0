/** What the rest of the server knows of the way out: that something may wait, and what this installation can send. */
export interface Outbox {
  /** After a commit that may have written into it. */
  poke(): void;
  /** The key by which push services of browsers know this server. */
  pushKey: string;
  /** Letters can be sent. */
  eMail: boolean;
}
