import jwt from 'jsonwebtoken';
import type { Secrets } from './secrets';
import { accessLifeMs } from './session-limits';

const algorithm = 'HS256';
const audience = 'bidewell';
const type = 'at+jwt';

export interface AccessClaims {
  personId: string;
  workshopId: string;
  sessionId: string;
}

/** A signed access token that ends 10 minutes after `now`. */
export function signAccessToken(secrets: Secrets, claims: AccessClaims, now: number): string {
  const iat = Math.floor(now / 1000);
  return jwt.sign(
    {
      sub: claims.personId,
      ws: claims.workshopId,
      sid: claims.sessionId,
      aud: audience,
      iat,
      nbf: iat,
      exp: iat + accessLifeMs / 1000,
    },
    secrets.accessKey,
    { algorithm, header: { alg: algorithm, typ: type } },
  );
}

/** What a token says, and until when (epoch ms); null for one that is not ours, not of this kind, or over. */
export function readAccessToken(
  secrets: Secrets,
  token: string,
  now: number,
): (AccessClaims & { expiresAt: number }) | null {
  try {
    const { header, payload } = jwt.verify(token, secrets.accessKey, {
      complete: true,
      algorithms: [algorithm],
      audience,
      clockTimestamp: Math.floor(now / 1000),
    });
    if (header.typ !== type || typeof payload === 'string') return null;
    const { sub, exp } = payload;
    const ws: unknown = payload.ws;
    const sid: unknown = payload.sid;
    if (typeof sub !== 'string' || typeof ws !== 'string' || typeof sid !== 'string' || typeof exp !== 'number')
      return null;
    return { personId: sub, workshopId: ws, sessionId: sid, expiresAt: exp * 1000 };
  } catch {
    return null;
  }
}
