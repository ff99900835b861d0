import { describe, expect, it } from 'vitest';
import type { OddDto } from '@/shared/contract/charge';
import { pointMarks } from '@/shared/ui/format/marks';
import { learnedRows } from '@/shared/ui/charge/learned-rows';
import { isOddReading, oddSeenWords, type Odd } from '@/shared/ui/charge/odd-seen-words';
import { iso, reading } from './charges';

const said = (odd: Partial<Odd>) => {
  const words = oddSeenWords(
    { kind: 'unexplained', quantity: 'amps', group: null, seen: 0, expected: 0, readings: 1, ...odd } as Odd,
    'A2',
    pointMarks,
  );
  return `${words.seen} Check first: ${words.checkFirst}`.replaceAll('\u00a0', ' ');
};

describe('an odd reading in words', () => {
  it.each<[Partial<Odd>, string]>([
    [
      { kind: 'stuck-current', seen: 3.1, expected: 0.4 },
      'Current has stood at 3.1 A. 0.4 A was expected. Check first: warmth at the groups, then what A2 is set to, then the clips.',
    ],
    [
      { kind: 'no-current', seen: 0, expected: 10 },
      'No current flows. 10.0 A was expected. Check first: whether A2 is on, then the clips, then its set voltage.',
    ],
    [
      { kind: 'voltage-jump', quantity: 'terminal-volts', seen: 12.1, expected: 11.64 },
      'The clips read 12.10 V. 11.64 V was expected. Check first: the clips and how they hold, then the leads.',
    ],
    [
      { kind: 'group-ahead', quantity: 'group-volts', group: 1, seen: 4.02, expected: 3.98 },
      'Group 2 reads 4.020 V. 3.980 V was expected. Check first: warmth at group 2, then the meter tip on its tab, then its busbar.',
    ],
    [
      { kind: 'too-warm', quantity: 'celsius', seen: 41.2, expected: 28 },
      'It has warmed to 41 °C. 28 °C was expected. Check first: where it is warmest, then the clips there. Hold the charge where it rises on.',
    ],
    [
      { kind: 'unexplained', quantity: 'amps', seen: -6, expected: -4 },
      '6.0 A was read. 4.0 A was expected. Check first: the reading itself, then the clips, then the set voltage.',
    ],
  ])('says what was seen, what was expected and what to check first: %o', (odd, text) => {
    expect(said(odd)).toBe(text);
  });
});

describe('the readings that are odd', () => {
  const odd: OddDto = {
    kind: 'stuck-current',
    quantity: 'amps',
    group: null,
    seen: 3.1,
    expected: 0.4,
    readings: 2,
    since: iso('13:30'),
  };

  it('are those from the first odd one on that tell of the same quantity', () => {
    expect(isOddReading(reading('13:30'), odd)).toBe(true);
    expect(isOddReading(reading('13:29'), odd)).toBe(false);
    expect(isOddReading(reading('13:36', { amps: null }), odd)).toBe(false);
    expect(isOddReading(reading('13:36'), null)).toBe(false);
  });
});

describe('what a charge has taught', () => {
  it('stands with its band of 8 in 10 beside what was known: 60 ± 0.78 Ah is 59.0 to 61.0', () => {
    const rows = learnedRows(
      {
        capacityAh: { mean: 60, sd: 0.78, priorMean: 62, priorSd: 3.9 },
        longOhm: null,
        leadOhm: { mean: 0.012, sd: 0.002, priorMean: 0.005, priorSd: 0.01 },
      },
      pointMarks,
    );
    expect(rows).toEqual([
      { name: 'Capacity of a group, Ah', now: '60.0 (59.0–61.0)', before: '62.0 (57.0–67.0)' },
      { name: 'Leads, mΩ', now: '12.0 (9.4–14.6)', before: '5.0 (0.0–17.8)' },
    ]);
  });
});
