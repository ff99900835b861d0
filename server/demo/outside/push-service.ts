/**
 * A push service of browsers on this machine: takes messages over TLS as RFC 8030 says, checks who sends them (RFC 8292)
 * and opens them as a browser would (RFC 8291, RFC 8188), with code of its own beside that of the library that seals them.
 */
import crypto from 'node:crypto';
import https from 'node:https';
import type { AddressInfo } from 'node:net';
import { makeLocalCertificate } from '../../local-certificate';
import { agentTo } from './agent-to';

export interface TakenPush {
  /** Name of the browser it came for. */
  browser: string;
  headers: { topic: string | undefined; ttl: number; urgency: string | undefined };
  /** What the service worker gets. */
  notice: { title: string; body: string; url: string; tag: string; id: string; turn: number };
  /** Public key of the sender, as its signature proved it. */
  sender: string;
  subject: string;
}

export interface FakeBrowser {
  endpoint: string;
  keys: { p256dh: string; auth: string };
}

export interface FakePushService {
  /** A browser subscribes; what it gives to the server. */
  subscribe(browser: string): FakeBrowser;
  taken: TakenPush[];
  /** What the next messages are answered, in place of 201; `undefined` takes the message. */
  answers: ({ status: number; retryAfterS?: number; takes?: boolean } | undefined)[];
  /** Browsers whose subscription has ended: 410. */
  ended: Set<string>;
  /** Connections that trust this service. */
  agent: https.Agent;
  /** Connections that end here wherever they were meant for. */
  everywhere: https.Agent;
  certificate: string;
  close(): Promise<void>;
}

const url64 = (text: string): Buffer => Buffer.from(text, 'base64url');
const hmac = (key: Buffer, data: Buffer): Buffer => crypto.createHmac('sha256', key).update(data).digest();

/** HKDF of one block, as RFC 8188 uses it. */
const hkdf = (salt: Buffer, secret: Buffer, info: Buffer, bytes: number): Buffer =>
  hmac(hmac(salt, secret), Buffer.concat([info, Buffer.from([1])])).subarray(0, bytes);

/** Opens a message of one record sealed for a browser. */
export function opened(body: Buffer, browser: { ecdh: crypto.ECDH; auth: Buffer }): string {
  const salt = body.subarray(0, 16);
  const idLength = body[20]!;
  const sender = body.subarray(21, 21 + idLength);
  const sealed = body.subarray(21 + idLength);
  const shared = browser.ecdh.computeSecret(sender);
  const info = Buffer.concat([Buffer.from('WebPush: info\0'), browser.ecdh.getPublicKey(), sender]);
  const secret = hkdf(browser.auth, shared, info, 32);
  const key = hkdf(salt, secret, Buffer.from('Content-Encoding: aes128gcm\0'), 16);
  const nonce = hkdf(salt, secret, Buffer.from('Content-Encoding: nonce\0'), 12);
  const cipher = crypto.createDecipheriv('aes-128-gcm', key, nonce);
  cipher.setAuthTag(sealed.subarray(-16));
  const plain = Buffer.concat([cipher.update(sealed.subarray(0, -16)), cipher.final()]);
  // The record ends with a 2 and what zeros pad it.
  return plain.subarray(0, plain.lastIndexOf(2)).toString('utf8');
}

interface Keys {
  ecdh: crypto.ECDH;
  auth: Buffer;
}

function newBrowser(): Keys {
  const ecdh = crypto.createECDH('prime256v1');
  ecdh.generateKeys();
  return { ecdh, auth: crypto.randomBytes(16) };
}

/** The keys of a browser by its name; those of the same name are the same. */
function browserOf(secret: Buffer, name: string): Keys {
  const derive = (use: string): Buffer => hmac(secret, Buffer.from(`${use} of ${name}`));
  const ecdh = crypto.createECDH('prime256v1');
  ecdh.setPrivateKey(derive('key'));
  return { ecdh, auth: derive('secret').subarray(0, 16) };
}

/** Whom the Authorization header names: its signature must be right and made for this service. */
export function senderOf(header: string, audience: string): { key: string; subject: string } {
  const [, token = '', key = ''] = /^vapid t=([^,]+), ?k=(.+)$/.exec(header) ?? [];
  const [head = '', claims = '', signature = ''] = token.split('.');
  const point = url64(key);
  const publicKey = crypto.createPublicKey({
    key: {
      kty: 'EC',
      crv: 'P-256',
      x: point.subarray(1, 33).toString('base64url'),
      y: point.subarray(33).toString('base64url'),
    },
    format: 'jwk',
  });
  const signed = Buffer.from(`${head}.${claims}`);
  if (!crypto.verify('sha256', signed, { key: publicKey, dsaEncoding: 'ieee-p1363' }, url64(signature)))
    throw new Error('The signature is not that of the key.');
  const { aud, sub } = JSON.parse(url64(claims).toString()) as { aud: string; sub: string };
  if (aud !== audience) throw new Error(`Signed for ${aud}.`);
  return { key, subject: sub };
}

export interface PushServiceOptions {
  /** From this the keys of every browser follow, so that those of an earlier start are known again. */
  secret?: Buffer;
  /** Where browsers say that the service is; left out: where it listens. */
  origin?: string;
}

/** @param taking called when a message was taken, before that is answered */
export async function startPushService(
  taking: (push: TakenPush) => void = () => {},
  { secret, origin }: PushServiceOptions = {},
): Promise<FakePushService> {
  const { chain, key, issuer } = await makeLocalCertificate(['localhost'], new Date());
  const browsers = new Map<string, Keys>();
  const known = (name: string) => browsers.get(name) ?? (secret ? browserOf(secret, name) : undefined);
  const taken: TakenPush[] = [];
  const answers: FakePushService['answers'] = [];
  const ended = new Set<string>();
  let audience = '';

  const server = https.createServer({ key, cert: chain }, (request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const name = decodeURIComponent((request.url ?? '').slice('/push/'.length));
      const browser = known(name);
      const answer = answers.shift();
      if (!browser || ended.has(name)) return void response.writeHead(410).end();
      if (answer && !answer.takes) {
        const retry = answer.retryAfterS === undefined ? {} : { 'Retry-After': String(answer.retryAfterS) };
        return void response.writeHead(answer.status, retry).end('not now');
      }
      try {
        const { key: sender, subject } = senderOf(request.headers.authorization ?? '', audience);
        const { topic, ttl, urgency } = request.headers as Record<string, string | undefined>;
        const push: TakenPush = {
          browser: name,
          headers: { topic, ttl: Number(ttl), urgency },
          notice: JSON.parse(opened(Buffer.concat(chunks), browser)) as TakenPush['notice'],
          sender,
          subject,
        };
        taken.push(push);
        taking(push);
        response.writeHead(answer?.status ?? 201).end();
      } catch (error) {
        response.writeHead(400).end(String(error));
      }
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  audience = origin ?? `https://localhost:${port}`;
  const agent = new https.Agent({ ca: issuer });
  const everywhere = agentTo(port, issuer);
  return {
    subscribe(browser) {
      const { ecdh, auth } = secret ? browserOf(secret, browser) : newBrowser();
      const p256dh = ecdh.getPublicKey('base64url');
      browsers.set(browser, { ecdh, auth });
      return {
        endpoint: `${audience}/push/${encodeURIComponent(browser)}`,
        keys: { p256dh, auth: auth.toString('base64url') },
      };
    },
    taken,
    answers,
    ended,
    agent,
    everywhere,
    certificate: issuer,
    close: () => {
      agent.destroy();
      everywhere.destroy();
      server.closeAllConnections();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
}
