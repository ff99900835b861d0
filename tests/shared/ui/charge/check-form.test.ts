import { describe, expect, it } from 'vitest';
import { decimalsProblem, restCheckSchemaFor } from '@/shared/contract/rest-check';
import { judgeTyped } from '@/shared/ui/charge/check-form';
import { needsWords, outsideWords } from '@/shared/ui/charge/check-words';
import { pointMarks } from '@/shared/ui/format/marks';

const window = { groupsInSeries: 2, chargeLimitVolts: 4.2, dischargeLimitVolts: 3 };
const read = (groupVolts: string[], celsius = '21', toleranceVolts = 0.005) => {
  const result = restCheckSchemaFor(window, toleranceVolts).safeParse({ groupVolts, celsius, meterId: null });
  return result.success
    ? { data: result.data }
    : { errors: Object.fromEntries(result.error.issues.map(({ path, message }) => [path.join('.'), message])) };
};
const judge = (typed: string[], more: { toleranceVolts?: number; offsetVolts?: number; targetVolts?: number } = {}) =>
  judgeTyped(typed, {
    window,
    targetVolts: 3.964,
    toleranceVolts: 0.005,
    offsetVolts: 0,
    chemistry: 'nmc',
    capacityAh: 60.4,
    ...more,
  });

describe('the check as it is typed', () => {
  it('does not take two decimals for 5 mV, but for 10 mV', () => {
    expect(read(['3.96', '3,957']).errors).toEqual({
      'groupVolts.0': 'Two decimals are not enough to judge 5\u00a0mV. Type three.',
    });
    expect(read(['3.96', '3.95'], '21', 0.01).data?.groupVolts).toEqual([3.96, 3.95]);
    expect(decimalsProblem('4', 0.005)).toBe('Whole volts are not enough to judge 5\u00a0mV. Type three.');
    expect(decimalsProblem('3957 mV', 0.005)).toBeNull();
  });

  it.each([
    ['39.64 V', "39.64\u00a0V is over this type's 4.20\u00a0V. A point in the wrong place?"],
    ['3964', "3964\u00a0V is over this type's 4.20\u00a0V. In millivolts? Then it is 3.964\u00a0V."],
    ['7.928', "7.928\u00a0V is over this type's 4.20\u00a0V. That looks like the whole module. Type each group."],
    ['four', '“four” is no number. Type it like 3.968.'],
    ['', 'The voltage is missing. Type it in V.'],
  ])('says what to change about %j', (text, sentence) => {
    expect(read([text, '3.957']).errors).toEqual({ 'groupVolts.0': sentence });
  });

  it('takes a number for what it says, and wants every group', () => {
    expect(
      restCheckSchemaFor(window, 0.005).parse({ groupVolts: [3.96, 3.957], celsius: null, meterId: null }),
    ).toEqual({
      groupVolts: [3.96, 3.957],
      celsius: null,
      meterId: null,
    });
    expect(read(['3.966']).errors).toEqual({ groupVolts: 'This type has 2 groups; 1 voltage was typed.' });
  });

  it('reads both decimal marks and a temperature', () => {
    expect(read(['3,966', '3.957 V'], '21,5').data).toEqual({
      groupVolts: [3.966, 3.957],
      celsius: 21.5,
      meterId: null,
    });
  });
});

describe('the verdict of a group', () => {
  it('is inside at +2 and outside at −7 mV of 5, and there is none before all digits are typed', () => {
    const [first, second] = judge(['3.966', '3,957']);
    expect([first?.within, second?.within]).toEqual([true, false]);
    expect(second?.deviationVolts).toBeCloseTo(-0.007, 9);
    expect(judge(['3.96', ''])).toEqual([null, null]);
    expect(judge(['', '3.957']).map((one) => one?.group ?? null)).toEqual([null, 1]);
  });

  it('takes the meter’s known offset off first: 3.971 with +2 mV is exactly 5 mV above, inside', () => {
    expect(judge(['3.971', '3.964'], { offsetVolts: 0.002 })[0]).toMatchObject({ within: true });
    expect(judge(['3.971', '3.964'])[0]).toMatchObject({ within: false });
  });

  it('is said in the words of the look', () => {
    const groups = judge(['3.966', '3.957']).filter((one) => one !== null);
    expect(outsideWords({ groups })).toBe('Group 2 is 7\u00a0mV below, outside.');
    expect(needsWords(groups, pointMarks)).toMatch(/^Group 2 needs \d\.\d\u00a0Ah more$/);
    const both = judge(['3.950', '3.957']).filter((one) => one !== null);
    expect(outsideWords({ groups: both })).toBe('Groups 1 and 2 are outside, at most 14\u00a0mV below.');
    const over = judge(['3.975', '3.964']).filter((one) => one !== null);
    expect(needsWords(over, pointMarks)).toMatch(/^Group 1 holds \d\.\d\u00a0Ah too much$/);
  });
});
