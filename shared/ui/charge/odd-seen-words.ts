/** A reading that the reckoning cannot explain, in words: what was seen, what was expected, what to check first. Pure. */
import type { OddDto, ReadingDto } from '@/shared/contract/charge';
import { oddCheckFirst } from '@/shared/contract/odd-check';
import type { LocaleMarks } from '../format/marks';
import { amps, celsius, clipVolts, volts } from '../format/quantities';

export type Odd = Omit<OddDto, 'since'>;

export interface OddWords {
  /** 'Current has stood at 3.1 A. 0.4 A was expected.' */
  seen: string;
  /** 'warmth at group 4, then its clips.' */
  checkFirst: string;
}

const valueOf = ({ quantity }: Pick<Odd, 'quantity'>, value: number, marks: LocaleMarks): string =>
  quantity === 'amps'
    ? amps(Math.abs(value), marks)
    : quantity === 'celsius'
      ? celsius(value)
      : quantity === 'group-volts'
        ? volts(value, marks)
        : clipVolts(value, marks);

/** What was read, as the begin of a sentence. */
function seenOf(odd: Odd, seen: string): string {
  const name = odd.group === null ? '' : `Group ${odd.group + 1} `;
  switch (odd.kind) {
    case 'no-current':
      return 'No current flows.';
    case 'stuck-current':
      return `Current has stood at ${seen}.`;
    case 'too-warm':
      return `It has warmed to ${seen}.`;
    default:
      return name
        ? `${name}reads ${seen}.`
        : odd.quantity === 'terminal-volts'
          ? `The clips read ${seen}.`
          : `${seen} was read.`;
  }
}

/** The three sentences of a call-out. */
export function oddSeenWords(odd: Odd, channel: string, marks: LocaleMarks): OddWords {
  return {
    seen: `${seenOf(odd, valueOf(odd, odd.seen, marks))} ${valueOf(odd, odd.expected, marks)} was expected.`,
    checkFirst: oddCheckFirst(odd, channel),
  };
}

const fields = {
  'terminal-volts': 'terminalVolts',
  amps: 'amps',
  'group-volts': 'groupVolts',
  celsius: 'celsius',
} as const satisfies Record<OddDto['quantity'], keyof ReadingDto>;

/** This reading is among those that do not fit: from the first of them on, with what is odd about them. */
export const isOddReading = (
  reading: Pick<ReadingDto, 'at' | (typeof fields)[OddDto['quantity']]>,
  odd: OddDto | null,
): boolean => odd !== null && Date.parse(reading.at) >= Date.parse(odd.since) && reading[fields[odd.quantity]] !== null;
