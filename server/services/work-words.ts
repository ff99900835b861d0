/** Other work in the sentences of refusals. */
import type { Work } from '../entities/work';
import { listText } from './charge-words';

/** 'Brake bleed W-0012' */
export const workName = ({ title, number }: Pick<Work, 'title' | 'number'>): string => `${title} ${number}`;

const NAMED = 3;

/** 'W-0003 and W-0009 need Bay 1. Change them first, or drop them.'; of many the first three by number. */
export function inUseText(work: readonly Pick<Work, 'number'>[], what: string): string {
  const numbers = work.map(({ number }) => number).sort();
  const more = numbers.length - NAMED;
  const named = listText(more > 0 ? [...numbers.slice(0, NAMED), `${more} more`] : numbers);
  const one = numbers.length === 1;
  return `${named} ${one ? 'needs' : 'need'} ${what}. Change ${one ? 'it' : 'them'} first, or drop ${one ? 'it' : 'them'}.`;
}
