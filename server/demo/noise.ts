import { inverseNormal, seededRandom } from '@/calc/index';

/** Chance that comes out the same every time: the demo of today is that of tomorrow, moved by a day. */
export interface Noise {
  /** 0…1. */
  share(): number;
  between(low: number, high: number): number;
  /** Standard normal, cut at three standard deviations. */
  normal(): number;
  pick<Item>(items: readonly Item[]): Item;
  /** True with this chance, 0…1. */
  chance(share: number): boolean;
}

export function makeNoise(seed: number): Noise {
  const share = seededRandom(seed);
  return {
    share,
    between: (low, high) => low + (high - low) * share(),
    normal: () => inverseNormal(0.00135 + 0.9973 * share()),
    pick: (items) => items[Math.min(items.length - 1, Math.floor(share() * items.length))]!,
    chance: (chance) => share() < chance,
  };
}

/** Rounded as a meter shows it: 3 decimals for a group, 2 at the clips, 1 for amps and degrees. */
export const shown = (value: number, decimals: number): number => Number(value.toFixed(decimals));
