/** When the wall says that it is not live. Instants in epoch ms. */
import { deadMs, quietMs } from '@/shared/contract/live';

/** live. quiet: not heard for 30 s. old: for 2 min, the header is the amber band. dark: for 15 min only the band stays. */
export type WallLink = 'live' | 'quiet' | 'old' | 'dark';

export const darkMs = 15 * 60_000;

/** @param heardAt null: not a word yet since this screen was switched on (`since`) */
export function wallLinkOf(heardAt: number | null, now: number, since: number): WallLink {
  const silent = now - (heardAt ?? since);
  if (silent >= darkMs) return 'dark';
  if (silent >= deadMs) return 'old';
  return silent >= quietMs ? 'quiet' : 'live';
}

/** Burn-in: the whole board moves 2 px along a ring every ten minutes. */
export function burnInShift(now: number): { x: number; y: number } {
  const ring = [
    [0, -2],
    [2, -2],
    [2, 0],
    [2, 2],
    [0, 2],
    [-2, 2],
    [-2, 0],
    [-2, -2],
  ] as const;
  const [x, y] = ring[Math.floor(now / 600_000) % ring.length]!;
  return { x, y };
}

/** Outside the workshop's hours everything but an alarm is dimmed; a closed day is dim all day. */
export function isDim(openToday: { from: string; to: string } | null, now: number): boolean {
  return openToday === null || now < Date.parse(openToday.from) || now >= Date.parse(openToday.to);
}
