import type { LogPreviewDto } from '@/shared/contract/charge-log';

const LINES_NAMED = 12;

/** Why lines are left out, and which: counted, with the first line numbers of each reason. */
export interface LeftOut {
  add: (key: string, reason: string, line: number) => void;
  list: () => LogPreviewDto['leftOut'];
}

/** @returns an empty count; lines of one key go under the reason that was given with the first of them */
export function countLeftOut(): LeftOut {
  const found = new Map<string, LogPreviewDto['leftOut'][number]>();
  return {
    add: (key, reason, line) => {
      const there = found.get(key) ?? { reason, count: 0, lines: [] };
      there.count += 1;
      if (there.lines.length < LINES_NAMED) there.lines.push(line);
      found.set(key, there);
    },
    list: () => [...found.values()].sort((one, other) => other.count - one.count),
  };
}
