import type { Request, Response } from 'express';
import type { SessionDto } from '@/shared/contract/session';
import { cookieOf, dropCookie, setCookie } from '../middleware/cookies';
import { deviceLifeMs } from '../services/device-cookie';
import { accessLifeMs } from '../services/session-limits';
import type { SignedIn } from '../services/sessions.service';
import type { AskingDevice } from '../services/sign-in.service';

/** What a request tells of the device it comes from. */
export const askingDevice = (request: Request): AskingDevice => ({
  address: request.ip,
  userAgent: request.get('user-agent'),
  deviceCookie: cookieOf(request, 'bidewell_device'),
});

/** The address people open, for links: the one set by the operator, else the one this request came to. */
export const baseUrlOf = (request: Request, publicUrl: string | null): string =>
  (publicUrl ?? `${request.protocol}://${request.host}`).replace(/\/+$/, '');

/** Puts the tokens into cookies; the answer itself never carries them. */
export function beginSession(
  response: Response,
  signedIn: SignedIn & { deviceCookie?: string },
  now: number,
): SessionDto {
  setCookie(response, 'bidewell_access', signedIn.accessToken, accessLifeMs);
  setCookie(response, 'bidewell_refresh', signedIn.refreshToken, signedIn.expiresAt - now);
  if (signedIn.deviceCookie) setCookie(response, 'bidewell_device', signedIn.deviceCookie, deviceLifeMs);
  return signedIn.session;
}

export function forgetSession(response: Response): void {
  dropCookie(response, 'bidewell_access');
  dropCookie(response, 'bidewell_refresh');
}
