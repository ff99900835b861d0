import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';
import { mark, sameText, type Secrets } from './secrets';
import { newToken } from './tokens';

/**
 * A refresh token: the session's id, 256 random bits, and our seal. By the seal a token that was replaced long ago is
 * still known as one of ours, and its use as a theft.
 */
export function newRefreshToken(secrets: Secrets, sessionId: string): string {
  const bare = `${sessionId}.${newToken()}`;
  return `${bare}.${mark(secrets.refreshKey, bare)}`;
}

/** The session a token was made for; null for one that we never made. */
export function sessionOfToken(secrets: Secrets, token: string): string | null {
  const end = token.lastIndexOf('.');
  if (end < 0 || !sameText(token.slice(end + 1), mark(secrets.refreshKey, token.slice(0, end)))) return null;
  return token.slice(0, token.indexOf('.')) || null;
}

const keyFrom = (token: string): Buffer => Buffer.from(hkdfSync('sha256', token, '', 'bidewell successor', 32));

/** Locks a successor so that only who still holds the token before it can have it: the database alone cannot. */
export function sealSuccessor(previous: string, successor: string): string {
  const nonce = randomBytes(12);
  const cipher = createCipheriv('aes-256-gcm', keyFrom(previous), nonce);
  const sealed = Buffer.concat([cipher.update(successor, 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
}

/** @throws Error when the token is not the one it was sealed with */
export function openSuccessor(previous: string, sealed: string): string {
  const bytes = Buffer.from(sealed, 'base64url');
  const decipher = createDecipheriv('aes-256-gcm', keyFrom(previous), bytes.subarray(0, 12));
  decipher.setAuthTag(bytes.subarray(12, 28));
  return Buffer.concat([decipher.update(bytes.subarray(28)), decipher.final()]).toString('utf8');
}
