/** What a code on a label means. Pure. */

export type Scanned =
  | { kind: 'charge'; id: string }
  | { kind: 'spare'; id: string }
  | { kind: 'label'; label: string }
  | { kind: 'nothing' };

/** Longest label a spare has. */
const LABEL_MOST = 30;

/**
 * A label of ours carries the address of its charge, under whatever name of the server it was printed; one that a workshop
 * has made itself carries the spare's label as a text.
 */
export function scannedOf(text: string): Scanned {
  const plain = text.trim();
  if (/^https?:\/\//i.test(plain)) {
    const [, what, id] = /^https?:\/\/[^/]+\/(charges|spares)\/([A-Za-z0-9_-]{1,64})\/?(?:[?#].*)?$/i.exec(plain) ?? [];
    if (!id) return { kind: 'nothing' };
    return { kind: what?.toLowerCase() === 'charges' ? 'charge' : 'spare', id };
  }
  return plain !== '' && plain.length <= LABEL_MOST && !/[\r\n\t]/.test(plain)
    ? { kind: 'label', label: plain }
    : { kind: 'nothing' };
}
