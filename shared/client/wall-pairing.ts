/**
 * A screen asks for the right to show a board (RFC 8628): it gets a code, shows it, and asks every few seconds whether
 * somebody has approved it. Renews the code by itself; survives a server that is away.
 */
import type { WallCodeDto } from '@/shared/contract/wall';
import { isProblem } from './api-problem';

export interface PairingEnvironment {
  askCode: () => Promise<WallCodeDto>;
  /** Resolves when it is approved; the answer sets the wall's cookie. */
  askToken: (deviceCode: string) => Promise<unknown>;
  /** The server's time, epoch ms. */
  now: () => number;
  wait: (ms: number) => Promise<void>;
  show: (state: PairingState) => void;
  stopped: () => boolean;
}

export type PairingState =
  | { kind: 'asking' }
  | { kind: 'code'; code: WallCodeDto }
  /** Somebody refused this screen; a new code comes. */
  | { kind: 'refused' }
  | { kind: 'unheard' }
  | { kind: 'paired' };

/** RFC 8628 §3.5: after slow_down the interval grows by 5 s. */
const slowDownS = 5;
const retryMs = 5000;

async function pollCode(env: PairingEnvironment, code: WallCodeDto): Promise<'paired' | 'again'> {
  const endsAt = Date.parse(code.expiresAt);
  let intervalS = code.intervalS;
  while (!env.stopped() && env.now() < endsAt) {
    await env.wait(intervalS * 1000);
    if (env.stopped()) break;
    try {
      await env.askToken(code.deviceCode);
      return 'paired';
    } catch (error) {
      // Not heard: the code stays good on the server, so it stays on the screen.
      if (!isProblem(error) || error.status >= 500) continue;
      if (error.code === 'authorization_pending') continue;
      if (error.code === 'slow_down' || error.status === 429) {
        intervalS = Math.max(intervalS + slowDownS, error.retryAfterS ?? 0);
        continue;
      }
      if (error.code === 'access_denied') {
        env.show({ kind: 'refused' });
        await env.wait(retryMs);
      }
      return 'again';
    }
  }
  return 'again';
}

/** Runs until the screen is paired or stopped. */
export async function pairWall(env: PairingEnvironment): Promise<void> {
  while (!env.stopped()) {
    let code: WallCodeDto;
    try {
      code = await env.askCode();
    } catch (error) {
      env.show({ kind: 'unheard' });
      await env.wait(isProblem(error) ? Math.max(retryMs, (error.retryAfterS ?? 0) * 1000) : retryMs);
      continue;
    }
    if (env.stopped()) return;
    env.show({ kind: 'code', code });
    if ((await pollCode(env, code)) === 'paired' && !env.stopped()) {
      env.show({ kind: 'paired' });
      return;
    }
  }
}
