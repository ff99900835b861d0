import { createHash, randomBytes } from 'node:crypto';

/** 256 random bits, safe in an address and in a cookie. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is kept of a token. It is random, so a plain hash is enough: there is nothing to guess. */
export const hashToken = (token: string): string => createHash('sha256').update(token).digest('base64url');
