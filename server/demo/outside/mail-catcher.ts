/** A mail server on this machine that keeps what it is given. */
import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';

export interface CaughtLetter {
  to: string[];
  from: string;
  /** The letter as it came. */
  raw: string;
  headers: Record<string, string>;
  /** Its parts, decoded, by their type. */
  parts: Record<string, string>;
}

export interface MailCatcher {
  caught: CaughtLetter[];
  /** SMTP codes of the next letters in place of 250. */
  refuse: number[];
  /** smtp://127.0.0.1:… */
  url: string;
  close(): Promise<void>;
}

/** Quoted-printable and base64 as RFC 2045 says. */
function decoded(text: string, encoding: string): string {
  if (encoding === 'base64') return Buffer.from(text, 'base64').toString('utf8');
  if (encoding !== 'quoted-printable') return text;
  const bytes = text.replace(/=\r?\n/g, '').replace(/=([0-9A-F]{2})/g, (_, hex: string) => `%${hex}`);
  return decodeURIComponent(bytes.replace(/%(?![0-9A-F]{2})/g, '%25'));
}

/** Words of a header that were encoded as RFC 2047 says. */
const decodedHeader = (text: string): string =>
  text
    .replace(/\?=\s+=\?/g, '?==?')
    .replace(/=\?utf-8\?([QB])\?([^?]*)\?=/gi, (_, kind: string, body: string) =>
      kind.toUpperCase() === 'B' ? decoded(body, 'base64') : decoded(body.replaceAll('_', ' '), 'quoted-printable'),
    );

const headersOf = (head: string): Record<string, string> =>
  Object.fromEntries(
    head
      .replace(/\r\n[ \t]+/g, ' ')
      .split('\r\n')
      .map((line) => {
        const colon = line.indexOf(':');
        return [line.slice(0, colon).toLowerCase(), decodedHeader(line.slice(colon + 1).trim())];
      }),
  );

function split(raw: string): { headers: Record<string, string>; body: string } {
  const end = raw.indexOf('\r\n\r\n');
  return { headers: headersOf(raw.slice(0, end)), body: raw.slice(end + 4) };
}

function partsOf(raw: string): Record<string, string> {
  const { headers, body } = split(raw);
  const boundary = /boundary="?([^";]+)"?/.exec(headers['content-type'] ?? '')?.[1];
  const pieces = boundary === undefined ? [raw] : body.split(`--${boundary}`).slice(1, -1);
  return Object.fromEntries(
    pieces.map((piece) => {
      const { headers: own, body: text } = split(piece.replace(/^\r\n/, ''));
      const type = (own['content-type'] ?? '').split(';')[0]!.trim();
      return [type, decoded(text, own['content-transfer-encoding'] ?? '')];
    }),
  );
}

/** @param taking called when a letter was taken, before that is answered */
export async function startMailCatcher(taking: (letter: CaughtLetter) => void = () => {}): Promise<MailCatcher> {
  const caught: CaughtLetter[] = [];
  const refuse: number[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    logger: false,
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const responseCode = refuse.shift();
        if (responseCode !== undefined) return void done(Object.assign(new Error('not this letter'), { responseCode }));
        const raw = Buffer.concat(chunks).toString('utf8');
        const { mailFrom, rcptTo } = session.envelope;
        const letter: CaughtLetter = {
          to: rcptTo.map(({ address }) => address),
          from: mailFrom ? mailFrom.address : '',
          raw,
          headers: split(raw).headers,
          parts: partsOf(raw),
        };
        caught.push(letter);
        taking(letter);
        done();
      });
    },
  });
  // A sender that is gone in the middle of a letter.
  server.on('error', () => {});
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.server.address() as AddressInfo;
  return {
    caught,
    refuse,
    url: `smtp://127.0.0.1:${port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
