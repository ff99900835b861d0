import type { CookieOptions, Request, Response } from 'express';

/** Our cookies. Over https their names carry `__Host-`, with which a browser takes them from this host only. */
export type CookieName = 'bidewell_access' | 'bidewell_refresh' | 'bidewell_device' | 'bidewell_wall';

export const cookieName = (name: CookieName, secure: boolean): string => (secure ? `__Host-${name}` : name);

/** Reads one cookie of a Cookie header. The first of a name counts, as the browser sends the most specific first. */
export function readCookie(header: string | undefined, name: CookieName, secure: boolean): string | undefined {
  const wanted = cookieName(name, secure);
  for (const part of (header ?? '').split(';')) {
    const at = part.indexOf('=');
    if (at > 0 && part.slice(0, at).trim() === wanted) return part.slice(at + 1).trim() || undefined;
  }
  return undefined;
}

const options = (secure: boolean): CookieOptions => ({ httpOnly: true, sameSite: 'strict', secure, path: '/' });

export const cookieOf = (request: Request, name: CookieName): string | undefined =>
  readCookie(request.headers.cookie, name, request.secure);

/** Sets a cookie that lives for `lifeMs`. */
export function setCookie(response: Response, name: CookieName, value: string, lifeMs: number): void {
  const { secure } = response.req;
  response.cookie(cookieName(name, secure), value, { ...options(secure), maxAge: lifeMs });
}

export function dropCookie(response: Response, name: CookieName): void {
  const { secure } = response.req;
  response.clearCookie(cookieName(name, secure), options(secure));
}
