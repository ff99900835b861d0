/** What came of sending one message to one device or one mailbox. */
export type Sent =
  | { kind: 'sent'; ticketId?: string }
  /** It may work later. */
  | { kind: 'failed'; reason: string; afterMs?: number }
  /** It will not work, however often it is tried. */
  | { kind: 'refused'; reason: string }
  /** The device is not there any more: it is forgotten. */
  | { kind: 'gone'; reason: string };

export const reasonOf = (error: unknown): string => {
  const text = error instanceof Error ? error.message : String(error);
  return text.replace(/\s+/g, ' ').slice(0, 200);
};
