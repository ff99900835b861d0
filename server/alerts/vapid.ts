import fs from 'node:fs';
import webPush from 'web-push';
import { pushKeyFile } from '../data-files';

/** By these a push service knows that it is still the same server (RFC 8292). */
export interface VapidKeys {
  /** Whom the service can ask: a https address or a mailto one. */
  subject: string;
  publicKey: string;
  privateKey: string;
}

/** Reads the keys of the data folder; makes them (mode 600) where there are none. Other keys would end every subscription. */
export function loadPushKeys(dataDir: string): Omit<VapidKeys, 'subject'> {
  const file = pushKeyFile(dataDir);
  if (!fs.existsSync(file))
    fs.writeFileSync(file, `${JSON.stringify(webPush.generateVAPIDKeys())}\n`, { mode: 0o600, flag: 'wx' });
  fs.chmodSync(file, 0o600);
  try {
    const { publicKey, privateKey } = JSON.parse(fs.readFileSync(file, 'utf8')) as Record<string, unknown>;
    if (typeof publicKey !== 'string' || Buffer.from(publicKey, 'base64url').length !== 65)
      throw new Error('no public key');
    if (typeof privateKey !== 'string' || Buffer.from(privateKey, 'base64url').length !== 32)
      throw new Error('no private key');
    return { publicKey, privateKey };
  } catch (error) {
    throw new Error(
      `${file} is damaged. Put it back from a backup, or delete it: pushes to browsers are then switched on anew by each person.`,
      { cause: error },
    );
  }
}

/** Whom a push service can ask about this server. */
export const pushSubject = (site: string | null, mailFrom: string | null): string => {
  if (site?.startsWith('https://')) return site;
  const address = mailFrom === null ? null : /[^<\s]+@[^>\s]+/.exec(mailFrom)?.[0];
  return `mailto:${address ?? 'alerts@bidewell.invalid'}`;
};
