import { describe, expect, it } from 'vitest';
import { groupCountProblem, groupVoltsProblem, groupVoltsProblems } from '@/shared/contract/group-volts';
import { spareReadingSchema, spareReadingSchemaFor } from '@/shared/contract/spare';

const nb = '\u00a0';
const twoSeries = { groupsInSeries: 2, chargeLimitVolts: 4.2, dischargeLimitVolts: 3 };
const lfp = { groupsInSeries: 4, chargeLimitVolts: 3.65, dischargeLimitVolts: 2.5 };

describe('group voltages against their type', () => {
  it.each([
    [39.68, `39.68${nb}V is over this type's 4.20${nb}V. A point in the wrong place?`],
    [3968, `3968${nb}V is over this type's 4.20${nb}V. In millivolts? Then it is 3.968${nb}V.`],
    [7.936, `7.936${nb}V is over this type's 4.20${nb}V. That looks like the whole module. Type each group.`],
    [4.6, `4.6${nb}V is over this type's 4.20${nb}V. Read it again, or check the type.`],
  ])('%s V gets its sentence', (volts, answer) => {
    expect(groupVoltsProblem(volts, twoSeries)).toBe(answer);
  });

  it('takes a slightly overcharged group and a deep-discharged one, which are true readings', () => {
    for (const volts of [4.21, 4.2, 3.0, 2.41, 0]) expect(groupVoltsProblem(volts, twoSeries)).toBeNull();
  });

  it('refuses the 3.968 V of another chemistry for a type of 3.65 V', () => {
    expect(groupVoltsProblem(3.968, lfp)).toBe(
      `3.968${nb}V is over this type's 3.65${nb}V. Read it again, or check the type.`,
    );
  });

  it('says 2 groups and 4 voltages, and 4 groups and 1 voltage', () => {
    expect(groupCountProblem(4, twoSeries)).toBe('This type has 2 groups; 4 voltages were typed.');
    expect(groupCountProblem(1, lfp)).toBe('This type has 4 groups; 1 voltage was typed.');
    expect(groupCountProblem(2, twoSeries)).toBeNull();
  });

  it('names the field of each voltage at fault under the path of its form', () => {
    expect(Object.keys(groupVoltsProblems([3.9, 39.6], twoSeries, 'reading.groupVolts'))).toEqual([
      'reading.groupVolts.1',
    ]);
    expect(Object.keys(groupVoltsProblems([3.9], twoSeries, 'groupVolts'))).toEqual(['groupVolts']);
  });
});

describe('the form of a spare’s reading', () => {
  const typed = (groupVolts: unknown[]) => ({ groupVolts, celsius: '', meterId: null });

  it('takes 3,612 V and 3606 mV as they are typed', () => {
    expect(spareReadingSchema.parse(typed(['3,612 V', '3606 mV']))).toMatchObject({
      groupVolts: [3.612, 3.606],
      celsius: null,
    });
  });

  it('that knows the type puts the type’s sentence at the group', () => {
    const issues = spareReadingSchemaFor(twoSeries).safeParse(typed(['3.612', '39.68 V'])).error?.issues ?? [];
    expect(issues.map(({ path, message }) => [path.join('.'), message])).toEqual([
      ['groupVolts.1', `39.68${nb}V is over this type's 4.20${nb}V. A point in the wrong place?`],
    ]);
  });

  it('that knows the type refuses 4 voltages for 2 groups at the list', () => {
    const issues = spareReadingSchemaFor(twoSeries).safeParse(typed(['3.6', '3.6', '3.6', '3.6'])).error?.issues ?? [];
    expect(issues.map(({ path, message }) => [path.join('.'), message])).toEqual([
      ['groupVolts', 'This type has 2 groups; 4 voltages were typed.'],
    ]);
  });

  it('says which group is empty and which has letters', () => {
    const issues = spareReadingSchema.safeParse(typed(['', 'abc'])).error?.issues ?? [];
    expect(issues.map(({ path, message }) => [path.join('.'), message])).toEqual([
      ['groupVolts.0', 'The voltage is missing. Type it in V.'],
      ['groupVolts.1', '“abc” is no number. Type it like 3.968.'],
    ]);
  });

  it('asks for each group where none is typed', () => {
    expect(spareReadingSchema.safeParse(typed([])).error?.issues[0]?.message).toBe('Type the voltage of each group.');
  });
});
