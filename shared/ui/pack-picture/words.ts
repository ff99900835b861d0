/** What the pack picture says in words: to readers, and in its call-out. Pure. */
import { pointMarks, type LocaleMarks } from '../format/marks';
import { millivoltsNumber, volts, voltsNumber } from '../format/quantities';

export interface OddModule {
  position: string;
  /** Odd groups of it, 0-based. */
  groups: number[];
}

/** Odd groups by module, the module with the group farthest off first. */
export function oddModules(
  groupVolts: readonly number[],
  odd: readonly number[],
  positions: readonly string[],
  medianVolts: number,
): OddModule[] {
  const found = new Map<string, number[]>();
  for (const group of odd) {
    const position = positions[group] ?? '';
    found.set(position, [...(found.get(position) ?? []), group]);
  }
  const off = (group: number) => Math.abs((groupVolts[group] ?? medianVolts) - medianVolts);
  const worst = ({ groups }: OddModule) => Math.max(...groups.map(off));
  return [...found].map(([position, groups]) => ({ position, groups })).sort((a, b) => worst(b) - worst(a));
}

/** 'Module 17: G33 3.871 V, G34 3.934 V'; of more than three groups the first three and how many more. */
export function oddText(
  { position, groups }: OddModule,
  groupVolts: readonly number[],
  marks: LocaleMarks = pointMarks,
): string {
  const told = groups.slice(0, 3).map((group) => `G${group + 1} ${volts(groupVolts[group] ?? 0, marks)}`);
  const more = groups.length - told.length;
  return `Module ${position}: ${told.join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
}

/** Of a word in the call-out's face at 14 px, bold, on average, px: a little more than most. */
const LETTER_PX = 7.8;

/**
 * The same as far as it fits: without the groups' names, then the module's worst voltage alone, then its name.
 * @param room px
 */
export function fittingOddText(
  one: OddModule,
  groupVolts: readonly number[],
  medianVolts: number,
  room: number,
  marks: LocaleMarks = pointMarks,
): string {
  const listed = one.groups.map((group) => groupVolts[group] ?? 0);
  const worst = listed.reduce((far, value) =>
    Math.abs(value - medianVolts) > Math.abs(far - medianVolts) ? value : far,
  );
  const name = `Module ${one.position}`;
  const shorter = [
    oddText(one, groupVolts, marks),
    ...(listed.length <= 3 ? [`${name}: ${listed.map((value) => volts(value, marks)).join(', ')}`] : []),
    `${name}: ${volts(worst, marks)}`,
  ];
  return shorter.find((text) => text.length * LETTER_PX <= room) ?? name;
}

/** 'Pack of 96 groups: median 3.968 V, spread 102 mV, lowest G33 3.871 V, highest G90 3.973 V. Odd: …' */
export function packTwin({
  groupVolts,
  odd,
  positions,
  medianVolts,
  marks = pointMarks,
}: {
  groupVolts: readonly number[];
  odd: readonly number[];
  positions: readonly string[];
  medianVolts: number;
  marks?: LocaleMarks;
}): string {
  const [low, high] = [Math.min(...groupVolts), Math.max(...groupVolts)];
  const at = (value: number) => `G${groupVolts.indexOf(value) + 1} ${voltsNumber(value, marks)} V`;
  const modules = oddModules(groupVolts, odd, positions, medianVolts);
  const named = modules.slice(0, 4).map((one) => oddText(one, groupVolts, marks));
  const more = modules.length - named.length;
  return [
    `Pack of ${groupVolts.length} groups: median ${volts(medianVolts, marks)}, spread ${millivoltsNumber(high - low)} mV, lowest ${at(low)}, highest ${at(high)}.`,
    named.length === 0
      ? 'No group stands out.'
      : `Odd: ${named.join('; ')}${more > 0 ? `; and ${more} more modules` : ''}.`,
  ].join(' ');
}
