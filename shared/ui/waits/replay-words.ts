import type { IntervalDto, TooFewDto } from '@/shared/contract/waits-replay';
import { duration, durationTable } from '../format/duration';
import { EN_DASH } from '../format/marks';
import { fixed } from '../format/number';
import { chargesWord } from './wait-words';

/** '26 (21–33)': hours a week, with the 80 % interval. */
export function lostWithInterval({ value, low, high }: IntervalDto): string {
  const decimals = Math.max(value, high) < 10 ? 1 : 0;
  const [a, b, c] = [value, low, high].map((one) => fixed(one, decimals));
  return b === c ? `${a}` : `${a} (${b}${EN_DASH}${c})`;
}

/** '2 h 10 (1:50–2:40)': a wait given in hours. */
export function waitWithInterval({ value, low, high }: IntervalDto): string {
  const [from, to] = [low, high].map((hours) => durationTable(hours * 3600, 'minute'));
  return `${duration(value * 3600, 'minute')}${from === to ? '' : ` (${from}${EN_DASH}${to})`}`;
}

/** 'Needs 20 charges, has 12.' */
export const tooFewWords = ({ needs, has }: TooFewDto): string => `Needs ${needs} charges, has ${has}.`;

/** 'Left out: 12 charges, no channel is known.' */
export const leftOutWords = (leftOut: readonly { charges: number; because: string }[]): string =>
  leftOut.length === 0
    ? ''
    : `Left out: ${leftOut.map(({ charges, because }) => `${chargesWord(charges)}, ${because.replace(/\.$/, '')}`).join('; ')}.`;
