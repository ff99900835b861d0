import { createHmac, createSecretKey, hkdfSync, randomBytes, timingSafeEqual, type KeyObject } from 'node:crypto';
import fs from 'node:fs';
import { secretFile } from '../data-files';

/** Keys of this installation, all from one secret that never leaves the data folder. */
export interface Secrets {
  /** Signs access tokens. Made once: building it from a string for every token is 30 times slower. */
  accessKey: KeyObject;
  /** Marks refresh tokens as ours. */
  refreshKey: Buffer;
  /** Marks the cookie of a device that has signed in. */
  deviceKey: Buffer;
  /** Marks the link by which a person ends the weekly digest. */
  digestKey: Buffer;
  /** From this the browsers of the demo's push service have their keys. */
  demoKey: Buffer;
}

/** Derives the keys from the secret. */
export function secretsFrom(secret: Buffer): Secrets {
  const derive = (use: string) => Buffer.from(hkdfSync('sha256', secret, '', `bidewell ${use}`, 32));
  return {
    accessKey: createSecretKey(derive('access token')),
    refreshKey: derive('refresh token'),
    deviceKey: derive('known device'),
    digestKey: derive('weekly digest'),
    demoKey: derive('browsers of the demo'),
  };
}

/** Reads the secret of the data folder; makes it (mode 600) where there is none. */
export function loadSecrets(dataDir: string): Secrets {
  const file = secretFile(dataDir);
  if (!fs.existsSync(file))
    fs.writeFileSync(file, `${randomBytes(32).toString('base64')}\n`, { mode: 0o600, flag: 'wx' });
  fs.chmodSync(file, 0o600);
  const secret = Buffer.from(fs.readFileSync(file, 'utf8').trim(), 'base64');
  if (secret.length < 32)
    throw new Error(`${file} is damaged. Put it back from a backup, or delete it: everybody then signs in again.`);
  return secretsFrom(secret);
}

/** Keyed hash, base64url. */
export const mark = (key: Buffer, text: string): string => createHmac('sha256', key).update(text).digest('base64url');

/** Compares two texts without telling by the time where they differ. */
export function sameText(a: string, b: string): boolean {
  const left = Buffer.from(a);
  const right = Buffer.from(b);
  return left.length === right.length && timingSafeEqual(left, right);
}
