import type { Band } from '@/calc/plan-types';

/**
 * The chance that the charge is still running at `t`: 0.9 at the earliest finish, 0.5 at the likely, 0.1 at the latest,
 * straight between them. Same unit of time throughout.
 */
export function stillRunning(t: number, { p10, p50, p90 }: Band): number {
  const chance =
    t <= p50
      ? 0.9 - (0.4 * (t - p10)) / Math.max(1e-9, p50 - p10)
      : 0.5 - (0.4 * (t - p50)) / Math.max(1e-9, p90 - p50);
  return Math.max(0, Math.min(1, chance));
}

export interface Slat {
  /** px from the left. */
  x: number;
  /** Height as a share of the ribbon's. */
  height: number;
}

/**
 * The slats of the comb from earliest to latest finish, `pitch` px apart; the place of the likely finish is left free
 * for its thick slat.
 */
export function combSlats(
  band: Band,
  toX: (t: number) => number,
  toTime: (x: number) => number,
  pitch: number,
): Slat[] {
  const slats: Slat[] = [];
  const [first, likely, last] = [toX(band.p10), toX(band.p50), toX(band.p90)];
  for (let x = first; x <= last + 0.1; x += pitch) {
    if (Math.abs(x - likely) < pitch * 0.95) continue;
    slats.push({ x, height: stillRunning(toTime(x), band) });
  }
  return slats;
}
