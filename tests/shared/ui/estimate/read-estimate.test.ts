import { describe, expect, it } from 'vitest';
import { emptyEstimate } from '@/shared/ui/estimate/estimate-typed';
import { readEstimate } from '@/shared/ui/estimate/read-estimate';

const typed = {
  ...emptyEstimate,
  spareVolts: '3.620',
  targetVolts: '3,925',
  ratedAh: '66 Ah',
  groups: '2',
  amps: '20',
};

describe('the quick estimate’s numbers', () => {
  it('are read with comma, point and pasted unit; what was left empty is null', () => {
    const { input, errors } = readEstimate(typed);
    expect(errors).toEqual({});
    expect(input).toMatchObject({ targetVolts: 3.925, ratedAh: 66, groups: 2, maxVolts: null, celsius: null });
  });

  it.each([
    ['spareVolts', '39.68 V', /point in the wrong place/],
    ['spareVolts', '3968', /looks like millivolts/],
    ['amps', '-5 A', /more than 0/],
    ['ratedAh', '0 Ah', /more than 0/],
    ['groups', '2.5', /whole number/],
    ['groups', '', /missing/],
    ['celsius', 'warm', /is no number/],
  ])('say at %s what to change about “%s”', (field, text, sentence) => {
    const { input, errors } = readEstimate({ ...typed, [field]: text });
    expect(input).toBeNull();
    expect(Object.keys(errors)).toEqual([field]);
    expect(errors[field as keyof typeof typed]).toMatch(sentence);
  });
});
