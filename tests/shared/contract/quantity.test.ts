import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { groupVolts, optionalQuantity, quantity } from '@/shared/contract/quantity';
import { readQuantity, type QuantityRule } from '@/shared/contract/read-quantity';

const nb = '\u00a0';
const amps: QuantityRule = { name: 'Amps', unit: 'A', min: 0, aboveMin: true, max: 2000 };
const rated: QuantityRule = { name: 'Rated capacity', unit: 'Ah', min: 0, aboveMin: true, max: 1000 };
const volts: QuantityRule = { name: 'Target', unit: 'V', min: 0, max: 5 };
const wholeGroups: QuantityRule = { name: 'Groups in series', unit: '', min: 1, max: 24, whole: true };

const sentence = (raw: unknown, rule: QuantityRule): string => {
  const reading = readQuantity(raw, rule);
  return reading.ok ? `taken as ${reading.value}` : reading.message;
};

describe('a typed quantity', () => {
  it.each<[raw: unknown, rule: QuantityRule, answer: string]>([
    ['39.68 V', volts, `39.68${nb}V is over 5${nb}V, the most for this. A point in the wrong place?`],
    ['3968', volts, `3968${nb}V is over 5${nb}V, the most for this. 3968 looks like millivolts: 3.968${nb}V?`],
    ['3,968 V', volts, 'taken as 3.968'],
    ['-5 A', amps, `−5${nb}A is too little. Amps is more than 0${nb}A.`],
    ['−5 A', amps, `−5${nb}A is too little. Amps is more than 0${nb}A.`],
    ['0 Ah', rated, `0${nb}Ah is too little. Rated capacity is more than 0${nb}Ah.`],
    ['', volts, 'Target is missing. Type it in V.'],
    ['   ', amps, 'Amps is missing. Type it in A.'],
    [undefined, wholeGroups, 'Groups in series is missing. Type it.'],
    ['abc', volts, '“abc” is no number. Type it like 3.968.'],
    ['two', wholeGroups, '“two” is no number. Type it like 60.'],
    ['3.9.68', volts, '“3.9.68” is no number. Type it like 3.968.'],
    ['20 V', amps, '“20 V” is in another unit. Type it in A.'],
    ['2.5', wholeGroups, 'Groups in series is a whole number.'],
    [Number.NaN, volts, 'Target is no number. Type it like 3.968.'],
    [Number.POSITIVE_INFINITY, volts, 'Target is no number. Type it like 3.968.'],
  ])('%o gives its sentence', (raw, rule, answer) => {
    expect(sentence(raw, rule)).toBe(answer);
  });

  it('takes comma and point, spaces, a pasted unit and mV as the same 3.968 V', () => {
    for (const raw of ['3.968', '3,968', ' 3.968 V', `3.968${nb}V`, '3.968v', '3968 mV', '+3.968', 3.968, '3 968 mV'])
      expect(sentence(raw, volts), String(raw)).toBe('taken as 3.968');
  });

  it('takes a tolerance typed as ±5, 5 mV or 0.005 V as 5 mV', () => {
    const tolerance: QuantityRule = { name: 'Tolerance', unit: 'mV', min: 1, max: 50 };
    for (const raw of ['±5', '5 mV', '0.005 V', '5', '5,0']) expect(sentence(raw, tolerance)).toBe('taken as 5');
  });

  it('keeps its least and most value, and refuses one step beyond either', () => {
    const rule: QuantityRule = { name: 'Health', unit: '%', min: 5, max: 120 };
    expect(sentence('5', rule)).toBe('taken as 5');
    expect(sentence('120 %', rule)).toBe('taken as 120');
    expect(sentence('4.9', rule)).toBe(`4.9${nb}% is under 5${nb}%, the least for this.`);
    expect(sentence('121', rule)).toContain(`121${nb}% is over 120${nb}%`);
  });

  it('reads back every number of 3 decimals however it is written', () => {
    const writing = fc.record({
      thousandths: fc.integer({ min: 0, max: 5000 }),
      comma: fc.boolean(),
      unit: fc.constantFrom('', ' V', 'V', `${nb}V`, ' volts'),
      pad: fc.constantFrom('', ' ', '\t'),
    });
    fc.assert(
      fc.property(writing, ({ thousandths, comma, unit, pad }) => {
        const digits = (thousandths / 1000).toFixed(3);
        const raw = `${pad}${comma ? digits.replace('.', ',') : digits}${unit}${pad}`;
        expect(sentence(raw, volts)).toBe(`taken as ${thousandths / 1000}`);
      }),
      { seed: 7, numRuns: 400 },
    );
  });

  it('answers any text at all with a number in range or one sentence that ends in a stop or a question', () => {
    fc.assert(
      fc.property(fc.string({ maxLength: 40 }), (raw) => {
        const reading = readQuantity(raw, volts);
        if (reading.ok) {
          expect(reading.value).toBeGreaterThanOrEqual(0);
          expect(reading.value).toBeLessThanOrEqual(5);
        } else expect(reading.message).toMatch(/^[^\n]{5,140}[.?]$/);
      }),
      { seed: 11, numRuns: 1000 },
    );
  });
});

describe('schemas of quantities', () => {
  it('give the same sentence as the reader, at the field', () => {
    const result = quantity(amps).safeParse('-5 A');
    expect(result.success).toBe(false);
    expect(result.error?.issues.map(({ message }) => message)).toEqual([sentence('-5 A', amps)]);
  });

  it('let an optional one be empty, and still refuse letters in it', () => {
    const optional = optionalQuantity({ name: 'Power', unit: 'W', min: 0, aboveMin: true });
    for (const blank of ['', '  ', null, undefined]) expect(optional.parse(blank)).toBeNull();
    expect(optional.parse('300 W')).toBe(300);
    expect(optional.safeParse('lots').error?.issues[0]?.message).toBe('“lots” is no number. Type it like 3.968.');
  });

  it('refuse a group voltage of minus half a volt', () => {
    expect(groupVolts.safeParse('-0.5').error?.issues[0]?.message).toBe(
      `−0.5${nb}V is too little. The voltage is at least 0${nb}V.`,
    );
  });
});
