import { setTimeout as pause } from 'node:timers/promises';
import type { BrowserContext } from 'playwright-core';
import type { Role } from '@/shared/contract/roles';
import type { WallCodeDto } from '@/shared/contract/wall';

async function post<Answer>(context: BrowserContext, url: string, address: string, data: unknown): Promise<Answer> {
  const answer = await context.request.post(url + address, { data, headers: { origin: url } });
  const text = await answer.text();
  if (!answer.ok()) throw new Error(`POST ${address} answered ${answer.status()}: ${text}`);
  return (text ? JSON.parse(text) : undefined) as Answer;
}

/** Signs the browser in as a role of the demo workshop: its pages carry the cookies from now on. */
export async function signInAs(context: BrowserContext, url: string, role: Role): Promise<void> {
  await post(context, url, '/api/demo/sign-in', { role });
}

/**
 * Pairs the browser as a wall screen, approved by another one that is signed in as foreman or manager. Takes the five
 * seconds that a wall waits between two questions.
 */
export async function pairAsWall(wall: BrowserContext, approver: BrowserContext, url: string): Promise<void> {
  const code = await post<WallCodeDto>(wall, url, '/api/wall/codes', {});
  const screen = { userCode: code.userCode, name: 'Hall', diagonalInches: '55', distanceMetres: '6' };
  await post(approver, url, '/api/wall/approvals', screen);
  await pause(code.intervalS * 1000 + 200);
  await post(wall, url, '/api/wall/token', { deviceCode: code.deviceCode });
}
