/** What was understood of a table, in words. Pure, and without the parser. */
import type { ReadingText, Separator } from './reading-text';

export const separatorNames: Record<Separator, string> = {
  comma: 'comma',
  semicolon: 'semicolon',
  tab: 'tab',
  space: 'space',
  none: 'nothing, one column',
};

const headers = (count: number): string =>
  count === 0 ? 'no header line' : count === 1 ? 'one header line skipped' : `${count} header lines skipped`;

/** '96 groups understood, in millivolts, one header line skipped. Right?' */
export function understoodSentence({ groupVolts, unit, headerLines }: ReadingText): string {
  const groups = groupVolts.length === 1 ? '1 group' : `${groupVolts.length} groups`;
  return `${groups} understood, in ${unit === 'mV' ? 'millivolts' : 'volts'}, ${headers(headerLines)}. Right?`;
}

/** What a line was read as: 'header, skipped', 'G1, module 1', 'G1 to G96', 'not used'. */
export function lineWords({ header, groups }: ReadingText['lines'][number], positions: readonly string[]): string {
  if (header) return 'header, skipped';
  const [first] = groups ?? [];
  if (first === undefined) return 'not used';
  return groups!.length === 1 ? `G${first + 1}, module ${positions[first] ?? ''}` : `G1 to G${groups!.length}`;
}
