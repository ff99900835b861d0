import { randomBytes } from 'node:crypto';
import { mark, sameText, type Secrets } from './secrets';

/**
 * The cookie of a device that has signed in. It opens nothing; it only spares its owner the throttle that somebody
 * else's wrong tries have drawn on the account. It holds a number of its own and a mark per account, and our seal.
 */
const mostAccounts = 8;
export const deviceLifeMs = 400 * 24 * 60 * 60_000;

interface Device {
  number: string;
  accounts: string[];
}

const accountMark = (secrets: Secrets, email: string): string =>
  mark(secrets.deviceKey, `account ${email}`).slice(0, 16);

function read(secrets: Secrets, cookie: string | undefined): Device | null {
  const [number, accounts, seal, more] = (cookie ?? '').split('~');
  if (!number || !accounts || !seal || more !== undefined) return null;
  if (!sameText(seal, mark(secrets.deviceKey, `device ${number}~${accounts}`))) return null;
  return { number, accounts: accounts.split('.') };
}

/** The number of a device that has signed in to this account before; null for any other. */
export function knownDevice(secrets: Secrets, cookie: string | undefined, email: string): string | null {
  const device = read(secrets, cookie);
  return device?.accounts.includes(accountMark(secrets, email)) ? device.number : null;
}

/** The cookie with this account among those the device has signed in to. */
export function rememberDevice(secrets: Secrets, cookie: string | undefined, email: string): string {
  const device = read(secrets, cookie) ?? { number: randomBytes(16).toString('base64url'), accounts: [] };
  const account = accountMark(secrets, email);
  const accounts = [account, ...device.accounts.filter((other) => other !== account)].slice(0, mostAccounts).join('.');
  return `${device.number}~${accounts}~${mark(secrets.deviceKey, `device ${device.number}~${accounts}`)}`;
}
