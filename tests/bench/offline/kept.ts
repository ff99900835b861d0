import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';

interface Kept {
  seed: number;
  /** Seconds that HiGHS had for it, and when. */
  seconds: number;
  date: string;
}

export interface KeptBounds {
  about: string;
  /** No plan has less weighted tardiness, h. */
  bench: (Kept & { boundHours: number })[];
  /** No plan has more weighted minutes. */
  fills: (Kept & { boundMinutes: number })[];
}

const file = path.resolve(import.meta.dirname, '../../calc/reference/bench-instances.json');
const about = [
  'Bounds proved offline by a mixed integer program (HiGHS 1.15.3) for the workshops and days that',
  'tests/calc/reference/bench-instances.ts draws by seed: `npx tsx tests/bench/offline/bench-bounds.ts` and',
  '`fill-bounds.ts`. Workshops: the dual bound of a time-indexed model of whole quarters of an hour, which is exact,',
  'solved to a gap of 0.2 % (bench-milp.ts), rounded down. Days: the dual bound of a relaxation that says who does what',
  'in which gap of a window but not when, with energetic rows per window, place and piece (fill-milp.ts), rounded up; the',
  'best plan may be under it. `seconds` is what HiGHS had.',
].join(' ');

/** The bounds proved so far. */
export function kept(): KeptBounds {
  if (!existsSync(file)) return { about, bench: [], fills: [] };
  return JSON.parse(readFileSync(file, 'utf8')) as KeptBounds;
}

/** Keeps one more bound, in place of an earlier one of the same seed. */
export function keep<K extends 'bench' | 'fills'>(kind: K, one: KeptBounds[K][number]): void {
  const all = kept();
  const others = (all[kind] as Kept[]).filter(({ seed }) => seed !== one.seed);
  const list = [...others, one].sort((a, b) => a.seed - b.seed);
  writeFileSync(file, `${JSON.stringify({ ...all, about, [kind]: list }, null, 2)}\n`);
}
