import { setTimeout as pause } from 'node:timers/promises';
import type { BrowserContext } from 'playwright-core';
import type { Role } from '@/shared/contract/roles';
import { storagePrefix } from '@/shared/client/storage';
import type { WallCodeDto } from '@/shared/contract/wall';

async function post<Answer>(context: BrowserContext, url: string, address: string, data: unknown): Promise<Answer> {
  const answer = await context.request.post(url + address, { data, headers: { origin: url } });
  const text = await answer.text();
  if (!answer.ok()) throw new Error(`POST ${address} answered ${answer.status()}: ${text}`);
  return (text ? JSON.parse(text) : undefined) as Answer;
}

/** Notes in the pages' storage what a page would have noted itself; once only, so that its end in the page lasts. */
async function rememberOnce(context: BrowserContext, key: string): Promise<void> {
  await context.addInitScript((name) => {
    const mark = `noted-by-test.${name}`;
    if (localStorage.getItem(mark)) return;
    localStorage.setItem(mark, '1');
    localStorage.setItem(name, '1');
  }, storagePrefix + key);
}

/**
 * Signs the browser in as a role of the demo workshop without walking through the sign-in page: its pages carry the
 * cookies from now on, and know, as after a sign-in there, that somebody has signed in here.
 */
export async function signInAs(context: BrowserContext, url: string, role: Role): Promise<void> {
  await post(context, url, '/api/demo/sign-in', { role });
  await rememberOnce(context, 'signed-in');
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
  await rememberOnce(wall, 'wall-paired');
}
